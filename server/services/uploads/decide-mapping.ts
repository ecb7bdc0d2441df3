import { Mapping } from '@shared/contract/uploads';
import { InvalidInput } from '../../http/errors';
import { type Lot } from '../../models';

export async function decideMapping(
  prefix: Buffer,
  lot: Lot,
  given: Mapping | null,
): Promise<{ mapping: Mapping; headings: string[] | null }> {
  if (given) return { mapping: given, headings: null };
  const first = prefix
    .toString('utf8', 0, 200)
    .replace('\ufeff', '')
    .split(/[\r\n]/)[0]!;
  if (first !== 'serial,temperature_c,frequency_hz,measured_at')
    throw new InvalidInput('need mapping', undefined, 'upload.mapping_needed');
  return {
    mapping: Mapping.parse({
      columns: [
        { target: 'serial' },
        { target: 'temperature' },
        { target: 'frequency', unit: 'Hz' },
        { target: 'measuredAt' },
      ],
    }),
    headings: first.split(','),
  };
}
