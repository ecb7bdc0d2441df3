import { type z } from 'zod';
import { type Mapping, type UploadWarning } from '@shared/contract/uploads';
import { ppm } from '@shared/format/ppm';
import { plainNumber } from '../plain-number';
import { convert } from './convert';

type Warning = z.infer<typeof UploadWarning>;

/** Beyond this a whole file is more likely in another unit, or of another part, than a lot of bad units. */
const DOUBTFUL_PPM = 2000;

/** What the first rows of a file, read as proposed, say against its unit, its part or its temperatures. */
export function doubtsAbout(
  rows: string[][],
  mapping: Mapping,
  headings: string[] | null,
  part: { nominalHz: string; chamber: { lowC: number | null; highC: number | null } },
): Warning[] {
  const found: Warning[] = [];
  const nameOf = (index: number) => headings?.[index] || `column ${index + 1}`;
  mapping.columns.forEach((column, index) => {
    const values = rows.map((row) => row[index] ?? '').filter((text) => text !== '');
    if (column.target === 'frequency') {
      const offsets = values
        .flatMap((text) => convert(text, column, mapping, part.nominalHz)?.offsetPpm ?? [])
        .sort((a, b) => a - b);
      const middle = offsets[offsets.length >> 1];
      if (values.length > 0 && middle === undefined)
        found.push(
          doubt(
            'frequency.none',
            `No value of ${nameOf(index)} is a frequency in ${column.unit}.`,
            nameOf(index),
          ),
        );
      else if (middle !== undefined && Math.abs(middle) > DOUBTFUL_PPM)
        found.push(
          doubt(
            'frequency.implausible',
            `Read in ${column.unit}, the middle value of ${nameOf(index)} lies ${ppm(middle, { significant: 3, sign: 'always' })} from nominal: is it another unit, or another part?`,
            nameOf(index),
          ),
        );
    }
    if (column.target === 'temperature') {
      const { lowC, highC } = part.chamber;
      const outside = values.filter((text) => {
        const number = plainNumber(text, mapping.decimalSign);
        if (!number.ok) return false;
        const celsius = Number(number.plain);
        return (lowC !== null && celsius < lowC) || (highC !== null && celsius > highC);
      });
      if (outside.length)
        found.push(
          doubt(
            'temperature.outside_chamber',
            `${nameOf(index)} holds ${outside[0]} °C, which the bench's chamber cannot reach.`,
            nameOf(index),
          ),
        );
    }
  });
  if (!mapping.columns.some((column) => column.target === 'serial') && mapping.serial === '')
    found.push(
      doubt(
        'serial.none',
        mapping.shape === 'time_series'
          ? 'No column names the unit: give the serial of the unit that was measured.'
          : 'No column names the units: they are numbered in the order of the file.',
        null,
      ),
    );
  return found;
}

function doubt(code: string, text: string, column: string | null): Warning {
  return { code, text, column, cleared: false };
}
