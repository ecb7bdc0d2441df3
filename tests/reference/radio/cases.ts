import { readFileSync } from 'node:fs';
import { expect } from 'vitest';

const folder = new URL('../data/radio/', import.meta.url);

export const readData = (name: string): string => readFileSync(new URL(name, folder), 'utf8');

interface Tolerance {
  kind: 'relative' | 'absolute';
  value: number;
}

export interface ReferenceCase {
  id: string;
  group: string;
  name: string;
  // The shape of inputs differs from group to group; each test reads its own.
  // eslint-disable-next-line @typescript-eslint/no-explicit-any
  inputs: any;
  // eslint-disable-next-line @typescript-eslint/no-explicit-any
  expected: Record<string, any>;
  tolerance: Tolerance | Record<string, Tolerance>;
  source: string;
}

const all: ReferenceCase[] = JSON.parse(readData('radio-formula-cases.json')).cases;

export const groupsOfCases = (): string[] => [...new Set(all.map((c) => c.group))];

export function casesOf(group: string): ReferenceCase[] {
  const cases = all.filter((c) => c.group === group);
  if (cases.length === 0) throw new Error(`no reference case of group ${group}`);
  return cases;
}

const isSingle = (t: ReferenceCase['tolerance']): t is Tolerance => typeof t.kind === 'string';

function toleranceOf({ id, tolerance }: ReferenceCase, field: string): Tolerance {
  const found = isSingle(tolerance) ? tolerance : (tolerance[field] ?? tolerance.default);
  if (!found) throw new Error(`${id} gives no tolerance for ${field}`);
  return found;
}

function expectField(reference: ReferenceCase, field: string, actual: unknown, wanted: unknown) {
  const place = `${reference.id} ${field} (${reference.source})`;
  if (Array.isArray(wanted)) {
    expect(Array.isArray(actual), place).toBe(true);
    const values = actual as unknown[];
    expect(values.length, place).toBe(wanted.length);
    wanted.forEach((value, i) => expectField(reference, field, values[i], value));
  } else if (typeof wanted === 'number') {
    const { kind, value } = toleranceOf(reference, field);
    const allowed = kind === 'relative' ? value * Math.abs(wanted) : value;
    expect(actual, place).toBeTypeOf('number');
    expect(
      Math.abs((actual as number) - wanted),
      `${place}: ${actual} for ${wanted}`,
    ).toBeLessThanOrEqual(allowed);
  } else {
    expect(actual, place).toEqual(wanted);
  }
}

/**
 * Every expected field of the case is met by a value of the same name, within the case's tolerance.
 * A field without a computed value fails: no check is passed over.
 */
export function expectCase(reference: ReferenceCase, computed: Record<string, unknown>): void {
  for (const [field, wanted] of Object.entries(reference.expected)) {
    expect(Object.keys(computed), `${reference.id} computes ${field}`).toContain(field);
    expectField(reference, field, computed[field], wanted);
  }
}

/** Rows of a data file with a heading line, as numbers by column name; empty cells become null. */
export function readTable(name: string): Record<string, string>[] {
  const [heading = '', ...lines] = readData(name).trim().split(/\r?\n/);
  const columns = heading.split(',');
  return lines.map((line) => {
    const cells = line.split(',');
    return Object.fromEntries(columns.map((column, i) => [column, cells[i] ?? '']));
  });
}
