import { InvalidInput } from '../../http/errors';
import { zipNames } from './zip-names';

export const evidenceTypes = {
  pdf: 'application/pdf',
  png: 'image/png',
  jpg: 'image/jpeg',
  jpeg: 'image/jpeg',
  csv: 'text/csv',
  txt: 'text/plain',
  xlsx: 'application/vnd.openxmlformats-officedocument.spreadsheetml.sheet',
} as const;
type Extension = keyof typeof evidenceTypes;

function startsWith(bytes: Buffer, ...signature: number[]): boolean {
  return signature.every((byte, index) => bytes[index] === byte);
}

/** Text carries no control characters but line ends, tabs and page feeds, and does not begin as a web page. */
function isText(bytes: Buffer): boolean {
  for (const byte of bytes) {
    if (byte < 32 && byte !== 9 && byte !== 10 && byte !== 12 && byte !== 13) return false;
    if (byte === 127) return false;
  }
  return !/^(\ufeff|ï»¿)?\s*<[!?a-z]/i.test(bytes.toString('latin1', 0, 200));
}

/** A workbook without macros: a ZIP with the parts that every workbook has. */
function isWorkbook(bytes: Buffer): boolean {
  const names = zipNames(bytes);
  return (
    names !== null &&
    names.includes('[Content_Types].xml') &&
    names.includes('xl/workbook.xml') &&
    !names.some((name) => /vbaProject|macrosheets|\.exe$/i.test(name))
  );
}

const looksLike: Record<Extension, (bytes: Buffer) => boolean> = {
  pdf: (bytes) => bytes.toString('latin1', 0, 5) === '%PDF-',
  png: (bytes) => startsWith(bytes, 0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a),
  jpg: (bytes) => startsWith(bytes, 0xff, 0xd8, 0xff),
  jpeg: (bytes) => startsWith(bytes, 0xff, 0xd8, 0xff),
  csv: isText,
  txt: isText,
  xlsx: isWorkbook,
};

/** The media type of an evidence file, told by name and content together; what a browser claims is not asked. */
export function evidenceType(fileName: string, bytes: Buffer): string {
  const extension = /\.([a-z0-9]+)$/i.exec(fileName)?.[1]?.toLowerCase() ?? '';
  const quoted = `“${fileName}”`;
  const refuse = (sentence: string) => {
    throw new InvalidInput(sentence, { files: sentence }, 'attachment.type');
  };
  if (!Object.hasOwn(evidenceTypes, extension))
    refuse(`${quoted} is not taken: send PDF, PNG, JPEG, CSV, TXT or XLSX.`);
  if (bytes.length === 0) refuse(`${quoted} is empty.`);
  if (!looksLike[extension as Extension](bytes))
    refuse(
      `${quoted} does not contain what its name says. Save it anew in that format and send it again.`,
    );
  return evidenceTypes[extension as Extension];
}
