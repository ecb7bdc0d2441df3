import { describe, expect, it } from 'vitest';
import { oneSidedToleranceFactor, twoSidedToleranceFactor } from '@shared/statistics/tolerance';
import file from '../data/statistics/tolerance-factors.json';
import { casesOf, expectWithin } from './cases';

type Factor = { n: number; p: number; confidence: number };

describe('normal tolerance factors against mpmath and scipy', () => {
  const oneSided = casesOf<Factor, number>(file, 'one-sided');
  const twoSided = casesOf<Factor, number>(file, 'two-sided');

  it('runs every case of the file', () => {
    expect(oneSided.length + twoSided.length).toBe(file.length);
    expect(file).toHaveLength(22);
  });

  it.each(oneSided)('$id $what $input', ({ input, expected, tolerance_rel }) => {
    const factor = oneSidedToleranceFactor(input.n, input.p, input.confidence);
    expectWithin(factor, expected, tolerance_rel);
  });

  it.each(twoSided)('$id $what $input', ({ input, expected, tolerance_rel }) => {
    const factor = twoSidedToleranceFactor(input.n, input.p, input.confidence);
    expectWithin(factor, expected, tolerance_rel);
  });
});
