import { type z } from 'zod';
import { type UploadWarning } from '@shared/contract/uploads';
import { type RowJudge } from './row-judge';

type Warning = z.infer<typeof UploadWarning>;

const warning = (code: string, text: string, column: string | null = null): Warning => ({
  code,
  text,
  column,
  cleared: false,
});
const count = (n: number, one: string, many = `${one}s`) => `${n} ${n === 1 ? one : many}`;

/** What is odd about a file that was loaded; somebody clears it before the lot is accepted. */
export function warningsOf(
  judge: RowJudge,
  mapping: { shape: string; startedAt: string | null; hasElapsed: boolean },
): Warning[] {
  const found: Warning[] = [];
  if (judge.implausible > 0)
    found.push(
      warning(
        'frequency.implausible',
        `${count(judge.implausible, 'reading')} of ${judge.readings} lie more than 50 000 ppm from nominal: is the unit or the part right?`,
      ),
    );
  if (judge.outsideChamber > 0)
    found.push(
      warning(
        'temperature.outside_chamber',
        `${count(judge.outsideChamber, 'reading')} carry temperatures that the bench's chamber cannot reach.`,
      ),
    );
  if (judge.units.overlapCount > 0)
    found.push(
      warning(
        'serial.overlap',
        `${count(judge.units.overlapCount, 'unit')} of this file were in earlier uploads of the lot already.`,
      ),
    );
  if (judge.announcedRows !== null && judge.announcedRows !== judge.rows)
    found.push(
      warning(
        'file.incomplete',
        `The file says that it holds ${count(judge.announcedRows, 'row')} and holds ${judge.rows}.`,
      ),
    );
  if (mapping.hasElapsed && mapping.startedAt === null)
    found.push(
      warning(
        'time.no_start',
        'No start of the series was given: its times count from 1970-01-01 and only their differences mean something.',
      ),
    );
  return found;
}
