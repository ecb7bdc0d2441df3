import { constants, gunzipSync } from 'node:zlib';
import { FileRefused } from '../errors';
import { gzipMark } from '../decode';

const foreign: { mark: number[]; what: string }[] = [
  { mark: [0x50, 0x4b, 0x03, 0x04], what: 'a spreadsheet or a zip archive' },
  { mark: [0x50, 0x4b, 0x05, 0x06], what: 'an empty zip archive' },
  { mark: [0xd0, 0xcf, 0x11, 0xe0], what: 'a spreadsheet in an old binary form' },
  { mark: [0x25, 0x50, 0x44, 0x46], what: 'a PDF document' },
  { mark: [0x89, 0x50, 0x4e, 0x47], what: 'a picture' },
  { mark: [0xff, 0xd8, 0xff], what: 'a picture' },
  { mark: [0x37, 0x7a, 0xbc, 0xaf], what: 'a 7z archive' },
  { mark: [0x52, 0x61, 0x72, 0x21], what: 'a rar archive' },
  { mark: [0x28, 0xb5, 0x2f, 0xfd], what: 'a zstd archive' },
  { mark: [0x42, 0x5a, 0x68], what: 'a bzip2 archive' },
  { mark: [0x7f, 0x45, 0x4c, 0x46], what: 'a program' },
];

export interface Content {
  compression: 'none' | 'gzip';
  /** The first bytes of the text, unpacked. */
  text: Buffer;
  /** Whether `text` is all there is. */
  complete: boolean;
}

/** Looks at what a file is by its content, never by its name. */
export function lookAtContent(prefix: Buffer, complete: boolean): Content {
  refuseForeign(prefix);
  if (!prefix.subarray(0, 2).equals(gzipMark))
    return { compression: 'none', text: prefix, complete };
  let text: Buffer;
  try {
    text = gunzipSync(prefix, {
      // A prefix ends in the middle; what it yields so far is enough.
      finishFlush: constants.Z_SYNC_FLUSH,
      maxOutputLength: 64 * 1024 * 1024,
    });
  } catch (error) {
    if (error instanceof RangeError)
      throw new FileRefused(
        'file.unpacks_too_large',
        'The compressed file unpacks to far more than its size. Upload it uncompressed.',
      );
    throw new FileRefused(
      'file.gzip_damaged',
      'The compressed file is damaged. Compress it again and upload it once more.',
    );
  }
  refuseForeign(text);
  if (text.subarray(0, 2).equals(gzipMark))
    throw new FileRefused('file.gzip_twice', 'The file is compressed twice. Unpack it once.');
  return {
    compression: 'gzip',
    text: text.subarray(0, 1024 * 1024),
    complete: complete && text.length <= 1024 * 1024,
  };
}

function refuseForeign(bytes: Buffer): void {
  const found = foreign.find(({ mark }) => mark.every((byte, index) => bytes[index] === byte));
  if (found)
    throw new FileRefused(
      'file.not_text',
      `This is ${found.what}, not a text file with columns. Save the readings as CSV and upload that.`,
    );
}
