import { type CertificateContent } from './content';
import {
  writeCriteria,
  writeDecision,
  writeHashes,
  writeHead,
  writeIdentity,
  writeLinks,
  writeNumbers,
  writePictures,
  writeSignatures,
  writeTemperatureAndTime,
} from './sections';
import { Sheet } from './sheet';

/**
 * The lot certificate as a PDF. The same content gives the same bytes: the only time in the file is that of the last
 * signature, and its id is made from what it says.
 */
export function makeCertificate(content: CertificateContent): Promise<Buffer> {
  const { signed, signatures, decisionNumber } = content;
  const last = signatures.at(-1)!;
  const title = `Lot certificate ${signed.lot.lotNumber}, decision ${decisionNumber}`;
  const sheet = new Sheet({ title, at: last.signedAt });
  for (const write of [
    writeHead,
    writeIdentity,
    writeDecision,
    writePictures,
    writeCriteria,
    writeNumbers,
    writeLinks,
    writeTemperatureAndTime,
    writeSignatures,
    writeHashes,
  ])
    write(sheet, content);
  return sheet.end({
    caution: signed.seen.caution,
    left: `${title}. Content ${last.contentHash.slice(0, 16)}…`,
  });
}
