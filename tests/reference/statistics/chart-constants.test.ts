import { describe, expect, it } from 'vitest';
import { chartConstants } from '@shared/statistics/control-chart';
import file from '../data/statistics/chart-constants.json';
import { expectWithin } from './cases';

describe('control chart constants against exact gamma functions', () => {
  it('has twelve cases', () => expect(file).toHaveLength(12));

  it.each(file)('$id subgroups of $input.n', ({ input, expected, tolerance_rel }) => {
    const { c4, a3, b3, b4 } = chartConstants(input.n);
    expectWithin(c4, expected.c4, tolerance_rel);
    expectWithin(a3, expected.A3, tolerance_rel);
    expectWithin(b3, expected.B3, tolerance_rel);
    expectWithin(b4, expected.B4, tolerance_rel);
  });
});
