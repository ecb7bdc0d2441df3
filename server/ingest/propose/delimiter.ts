import { type Mapping } from '@shared/contract/uploads';
import { sampleRecords } from './records';

type Delimiter = Mapping['delimiter'];

export interface DelimiterProposal {
  delimiter: Delimiter;
  /** `10000000,125` in every row: two columns, or one with a decimal comma. */
  decimalCommaPossible: boolean;
}

const candidates: Delimiter[] = ['\t', ';', ','];

/**
 * The sign that cuts the header and the rows after it into the same number of columns. Counts outside quotes; on a tie
 * tab wins over semicolon over comma, because a comma may also be a decimal sign.
 */
export function proposeDelimiter(text: Buffer): DelimiterProposal {
  let best: Delimiter = ',';
  let bestScore = 0;
  for (const delimiter of candidates) {
    const records = sampleRecords(text, delimiter, 100);
    const columns = records[0]?.fields.length ?? 1;
    if (columns < 2) continue;
    const agreeing = records.filter(({ fields }) => fields.length === columns).length;
    const score = agreeing / records.length + (agreeing === records.length ? 1 : 0);
    if (score > bestScore) {
      best = delimiter;
      bestScore = score;
    }
  }
  const records = sampleRecords(text, ',', 100);
  const decimalCommaPossible =
    best === ',' &&
    records.length > 0 &&
    records.every(
      ({ fields }) => fields.length === 2 && fields.every((field) => /^[+-]?\d+$/.test(field)),
    );
  if (bestScore === 0)
    return { delimiter: headedDecimalComma(records) ? ';' : ',', decimalCommaPossible };
  return { delimiter: best, decimalCommaPossible };
}

/** One heading without a comma above values with one: a single column of decimal commas. */
function headedDecimalComma(records: { fields: string[] }[]): boolean {
  const [head, ...rows] = records;
  return (
    head?.fields.length === 1 &&
    rows.length > 0 &&
    rows.every(({ fields }) => fields.length === 2 && fields.every((f) => /^[+-]?\d+$/.test(f)))
  );
}
