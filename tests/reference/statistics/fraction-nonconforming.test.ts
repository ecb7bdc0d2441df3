import { describe, expect, it } from 'vitest';
import {
  clopperPearson,
  plugInShare,
  shareUpperBound,
  unbiasedShare,
} from '@shared/statistics/fraction-beyond';
import file from '../data/statistics/fraction-nonconforming.json';
import { casesOf, expectWithin } from './cases';

interface OneLimit {
  n: number;
  q: number;
  confidence?: number;
}

/** A standard sample whose high limit lies q standard deviations above the mean. */
const standard = ({ n }: OneLimit) => ({ n, mean: 0, sd: 1 });
const above = ({ q }: OneLimit) => ({ low: null, high: q });

const compute: Record<string, (input: OneLimit) => number> = {
  'one limit, minimum variance unbiased estimate from Q=(limit-mean)/s': (input) =>
    unbiasedShare(standard(input), above(input)),
  'one limit, plug-in normal estimate': (input) => plugInShare(standard(input), above(input)),
  'one limit, exact 95 % upper confidence bound': (input) =>
    shareUpperBound(standard(input), above(input), input.confidence),
};

describe('share beyond limits against scipy and mpmath', () => {
  const oneLimit = casesOf<OneLimit, number>(file, 'one limit');
  const counted = casesOf<
    { found: number; n: number; confidence: number },
    { low: number; high: number; upper_one_sided: number }
  >(file, 'Clopper-Pearson');

  it('runs every case of the file', () => {
    expect(oneLimit.length + counted.length).toBe(file.length);
    expect(file).toHaveLength(20);
  });

  it.each(oneLimit)('$id $what $input', ({ what, input, expected, tolerance_rel }) => {
    expectWithin(compute[what]!(input), expected, tolerance_rel);
  });

  it.each(counted)('$id $what $input', ({ input, expected, tolerance_rel }) => {
    const { low, high, upperBound } = clopperPearson(input.found, input.n, input.confidence);
    expectWithin(low, expected.low, tolerance_rel);
    expectWithin(high, expected.high, tolerance_rel);
    expectWithin(upperBound, expected.upper_one_sided, tolerance_rel);
  });
});
