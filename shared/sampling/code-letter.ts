import { requireWhole } from '../statistics/checks';
import { StatisticsError } from '../statistics/errors';
import { type CodeLetter, type InspectionLevel } from './rule';
import { CODE_LETTER_ROWS } from './tables/code-letters';

/**
 * Code letter of a lot.
 * @param lotSize units in the lot, 1 or more (a lot of one is read with the smallest row)
 * @throws StatisticsError when the lot size is not a whole number of 1 or more, or the level is unknown
 * Source: MIL-STD-105E, table I.
 */
export function codeLetterFor(lotSize: number, level: InspectionLevel): CodeLetter {
  requireWhole(lotSize, 'lotSize', 1);
  const row = CODE_LETTER_ROWS.find(({ lotTo }) => lotTo === null || lotSize <= lotTo)!;
  const letter = row.letters[level] as CodeLetter | undefined;
  if (letter === undefined)
    throw new StatisticsError(
      'out_of_range',
      'level',
      `must be I, II, III or S-1 to S-4, got ${String(level)}`,
    );
  return letter;
}
