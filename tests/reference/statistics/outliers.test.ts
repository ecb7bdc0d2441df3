import { describe, expect, it } from 'vitest';
import { generalisedEsd } from '@shared/statistics/outliers';
import { sortedAscending } from '@shared/statistics/sorted';
import file from '../data/statistics/outliers.json';
import { expectWithin } from './cases';

describe('generalised ESD against the NIST/SEMATECH e-Handbook', () => {
  it('has one case', () => expect(file).toHaveLength(1));

  it.each(file)('$id $what', ({ input, expected, tolerance_rel }) => {
    const sorted = sortedAscending(Float64Array.from(input.data));
    const test = generalisedEsd(sorted, input.max_outliers, input.alpha);
    expect(test.outliers).toEqual(expected.values);
    expect(test.outliers).toHaveLength(expected.outliers);
    expect(test.steps).toHaveLength(expected.r.length);
    test.steps.forEach(({ r }, i) => expectWithin(r, expected.r[i]!, tolerance_rel));
  });
});
