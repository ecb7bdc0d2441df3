import { type Mapping } from '@shared/contract/uploads';
import { formatNumber } from '@shared/format/number';
import { ppm } from '@shared/format/ppm';
import { offsetPpm } from '@shared/radio/offset';
import { toHzText } from '@shared/radio/units';
import { plainNumber } from '../plain-number';

type Frequency = Extract<Mapping['columns'][number], { target: 'frequency' }>;

/** A value of a frequency column as offset from nominal in ppm; null when it is no frequency. */
export function convert(
  text: string,
  column: Frequency,
  mapping: Mapping,
  nominalHz: string,
): { plain: string; offsetPpm: number } | null {
  const number = plainNumber(text, mapping.decimalSign);
  if (!number.ok) return null;
  const hz = toHzText(number.plain, column.unit, nominalHz);
  if (!(Number(hz) > 0)) return null;
  return { plain: number.plain, offsetPpm: offsetPpm(hz, nominalHz) };
}

/** "9.999987 MHz = −1.3 ppm": shows whether the unit is right. */
export function exampleOf(
  values: string[],
  column: Mapping['columns'][number],
  mapping: Mapping,
  nominalHz: string,
): string {
  for (const text of values) {
    if (text === '') continue;
    if (column.target === 'frequency') {
      const converted = convert(text, column, mapping, nominalHz);
      if (!converted) continue;
      const offset = ppm(converted.offsetPpm, { significant: 3, sign: 'always' });
      return column.unit === 'ppm'
        ? `${converted.plain} ppm`
        : `${converted.plain} ${column.unit} = ${offset}`;
    }
    if (column.target === 'serial') return text;
    if (column.target === 'temperature') {
      const number = plainNumber(text, mapping.decimalSign);
      if (number.ok) return `${formatNumber(Number(number.plain), { significant: 4 })} °C`;
    }
    if (column.target !== 'ignore') return text;
  }
  return '';
}
