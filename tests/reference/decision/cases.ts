import { expect } from 'vitest';

export interface Tolerance {
  kind: 'absolute' | 'relative';
  value: number;
}

interface Case {
  expected: Record<string, unknown>;
  tolerance: object;
}

/**
 * Every expected field of a case against what was computed: a tolerance without field names applies to each number,
 * 'default' to the fields not named; words, truth values and whole counts compare exactly.
 */
export function expectCase({ expected, tolerance }: Case, computed: Record<string, unknown>): void {
  for (const [field, wanted] of Object.entries(expected)) {
    expect(computed, `no value computed for ${field}`).toHaveProperty(field);
    compare(field, wanted, computed[field], toleranceOf(tolerance, field));
  }
}

function toleranceOf(tolerance: object, field: string): Tolerance {
  if ('kind' in tolerance) return tolerance as Tolerance;
  const named = tolerance as Record<string, Tolerance>;
  const found = named[field] ?? named.default;
  if (!found) throw new Error(`no tolerance for ${field}`);
  return found;
}

function compare(field: string, wanted: unknown, got: unknown, tolerance: Tolerance): void {
  if (Array.isArray(wanted)) {
    expect((got as unknown[]).length, field).toBe(wanted.length);
    wanted.forEach((each, index) =>
      compare(`${field}[${index}]`, each, (got as unknown[])[index], tolerance),
    );
    return;
  }
  if (typeof wanted !== 'number') {
    expect(got, field).toBe(wanted);
    return;
  }
  const allowed =
    tolerance.kind === 'relative' ? tolerance.value * Math.abs(wanted) : tolerance.value;
  expect(
    Math.abs((got as number) - wanted),
    `${field}: wanted ${wanted}, got ${String(got)}`,
  ).toBeLessThanOrEqual(allowed);
}
