import { expect } from 'vitest';

/** One published or independently computed value, as kept in tests/reference/data/statistics. */
export interface ReferenceCase<Input, Expected> {
  id: string;
  what: string;
  source: string;
  input: Input;
  expected: Expected;
  tolerance_rel: number;
  note: string;
}

/** The cases of a file whose `what` starts with the given words; a renamed or emptied group fails loudly. */
export function casesOf<Input, Expected>(file: unknown, what: string) {
  const cases = (file as ReferenceCase<Input, Expected>[]).filter((entry) =>
    entry.what.includes(what),
  );
  if (cases.length === 0) throw new Error(`no reference case "${what}"`);
  return cases;
}

/** Relative agreement; an expected zero must be met exactly. */
export function expectWithin(actual: number, expected: number, relative: number): void {
  expect(Number.isFinite(actual), `${actual} is finite`).toBe(true);
  const gap = Math.abs(actual - expected);
  expect(gap, `${actual} against ${expected}`).toBeLessThanOrEqual(relative * Math.abs(expected));
}
