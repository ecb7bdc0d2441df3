import { type Mapping } from '@shared/contract/uploads';
import { plainNumber } from '../plain-number';
import { meaningOf } from './headings';

type Target = Mapping['columns'][number];
type Unit = Extract<Target, { target: 'frequency' }>['unit'];

export interface ColumnsProposal {
  columns: Target[];
  shape: Mapping['shape'];
  /** Columns whose unit neither heading nor values tell. */
  unsureUnits: number[];
  frequencyFound: boolean;
}

const isInstant = (text: string) => /^\d{4}-\d{2}-\d{2}([T ]\d{2}:\d{2}|$)/i.test(text);

/** What each column is for, by its heading and, where that says nothing, by its values. */
export function proposeColumns(
  headings: string[] | null,
  rows: string[][],
  decimalSign: '.' | ',',
  nominalHz: string,
): ColumnsProposal {
  const count = headings?.length ?? Math.max(1, ...rows.map((row) => row.length));
  const values = (column: number) => rows.map((row) => row[column] ?? '').filter((v) => v !== '');
  const numbers = (column: number) =>
    values(column).flatMap((text) => {
      const number = plainNumber(text, decimalSign);
      return number.ok ? [Number(number.plain)] : [];
    });
  const unsureUnits: number[] = [];
  const taken = new Set<string>();
  const columns: Target[] = [];
  const frequencyOf = (column: number, unit: Unit | null, temperatureC: number | null): Target => {
    const seen = unit ?? unitByValue(numbers(column), Number(nominalHz));
    if (!seen) unsureUnits.push(column);
    taken.add('frequency');
    return { target: 'frequency', unit: seen ?? 'Hz', temperatureC };
  };
  for (let column = 0; column < count; column += 1) {
    const meaning = headings ? meaningOf(headings[column] ?? '') : null;
    if (!meaning || (meaning.target !== 'frequency' && taken.has(meaning.target)))
      columns.push({ target: 'ignore' });
    else if (meaning.target === 'frequency') {
      const again = taken.has('frequency') && meaning.temperatureC === null;
      columns.push(
        again ? { target: 'ignore' } : frequencyOf(column, meaning.unit, meaning.temperatureC),
      );
    } else {
      // A clock time may be called "time" and hold seconds.
      const elapsed =
        meaning.target === 'measuredAt' &&
        values(column).length > 0 &&
        numbers(column).length === values(column).length;
      const target = elapsed ? 'elapsedSeconds' : meaning.target;
      taken.add(target);
      columns.push({ target } as Target);
    }
  }
  guessByValues();

  const temperatures = columns.filter((c) => c.target === 'frequency' && c.temperatureC !== null);
  const hasSerial = columns.some((c) => c.target === 'serial');
  const hasElapsed = columns.some((c) => c.target === 'elapsedSeconds');
  return {
    columns,
    shape:
      temperatures.length > 1
        ? 'unit_per_row'
        : hasElapsed && !hasSerial
          ? 'time_series'
          : 'reading_per_row',
    unsureUnits,
    frequencyFound: taken.has('frequency'),
  };

  function guessByValues(): void {
    const open = columns.flatMap((c, i) =>
      c.target === 'ignore' && (!headings || meaningOf(headings[i] ?? '') === null) ? [i] : [],
    );
    if (!taken.has('frequency')) {
      const near = open.find((i) => isAll(i) && unitByValue(numbers(i), Number(nominalHz)));
      const only = count === 1 && isAll(0) ? 0 : undefined;
      const column = near ?? only;
      if (column !== undefined) columns[column] = frequencyOf(column, null, null);
    }
    if (headings) return;
    for (const i of open) {
      if (columns[i]!.target !== 'ignore') continue;
      const all = values(i);
      if (all.length === 0) continue;
      if (!taken.has('measuredAt') && all.every(isInstant)) set(i, 'measuredAt');
      else if (!taken.has('serial') && new Set(all).size === all.length) set(i, 'serial');
      else if (!taken.has('serial') && !isAll(i)) set(i, 'serial');
      else if (
        !taken.has('temperature') &&
        isAll(i) &&
        numbers(i).every((t) => t >= -70 && t <= 200)
      )
        set(i, 'temperature');
    }
  }
  function isAll(column: number): boolean {
    const all = values(column);
    return all.length > 0 && numbers(column).length === all.length;
  }
  function set(column: number, target: 'serial' | 'temperature' | 'measuredAt'): void {
    columns[column] = { target };
    taken.add(target);
  }
}

/** The unit in which the values lie within a tenth of nominal; small values could be ppm or ppb and decide nothing. */
function unitByValue(values: number[], nominalHz: number): Unit | null {
  if (values.length === 0) return null;
  const middle = [...values].sort((a, b) => a - b)[values.length >> 1]!;
  for (const [unit, factor] of [
    ['Hz', 1],
    ['kHz', 1e3],
    ['MHz', 1e6],
  ] as const)
    if (Math.abs((middle * factor) / nominalHz - 1) < 0.1) return unit;
  return null;
}
