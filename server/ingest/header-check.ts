import { type Mapping } from '@shared/contract/uploads';
import { FileRefused } from './errors';
import { limits } from './limits';
import { type RecordSink } from './record-reader';
import { type RowJudge } from './row-judge';

/** Our own refused-rows export adds this column; it is passed over when the file comes back. */
export const reasonColumn = 'reason';

/** Takes the first record that is not blank as the header, and hands everything after it to the judge. */
export function checkHeader(judge: RowJudge, mapping: Mapping): RecordSink {
  let seen = false;
  return {
    record(bytes, bounds, count, fileLine) {
      if (seen) {
        judge.record(bytes, bounds, count, fileLine);
        return;
      }
      const names: string[] = [];
      for (let i = 0; i < Math.min(count, limits.columns + 1); i += 1)
        names.push(bytes.toString('utf8', bounds[2 * i], bounds[2 * i + 1]).trim());
      if (names.every((name) => name === '')) return;
      seen = true;
      const mapped = mapping.columns.length;
      const withReason =
        names.length === mapped + 1 && names.at(-1)?.toLowerCase() === reasonColumn;
      if (names.length !== mapped && !withReason)
        throw new FileRefused(
          'file.columns',
          `The header has ${count} columns where the mapping has ${mapped}. Map the columns in the check step and upload again.`,
        );
      judge.useHeader(names);
    },
    broken(bytes, start, end, fileLine, rule) {
      if (seen) judge.broken(bytes, start, end, fileLine, rule);
      else
        throw new FileRefused(
          'file.header',
          `The header on line ${fileLine} cannot be read: ${rule === 'quotes' ? 'a quote is not closed' : 'it is too long'}.`,
        );
    },
  };
}
