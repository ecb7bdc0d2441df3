import { describe, expect, it } from 'vitest';
import fc from 'fast-check';
import { tryLimits } from '@shared/analysis/what-if';
import { normalQuantile } from '@shared/statistics/distributions/normal';
import { analysisFixture } from '../../support/lot-fixture';

const lot = Float64Array.from({ length: 400 }, (_, i) => 3 * normalQuantile((i + 0.5) / 400));

describe('other limits tried on a lot', () => {
  it('says of the limits in force what the analysis says', () => {
    const { analysis, sortedPpm } = analysisFixture({ beyondPpm: [-12, 10, -10, 11] });
    const tried = tryLimits(sortedPpm, { lowPpm: -10, highPpm: 10 });
    expect(tried.count).toBe(2);
    expect(tried).toMatchObject(analysis.beyond.limits);
    expect(tried.histogram).toEqual(analysis.histogram);
  });

  it('counts fewer units beyond wider limits, and every unit in the histogram', () => {
    const half = fc.double({ min: 0.5, max: 15, noNaN: true });
    fc.assert(
      fc.property(half, half, (a, b) => {
        const of = (width: number) => tryLimits(lot, { lowPpm: -width, highPpm: width });
        const [narrow, wide] = [of(Math.min(a, b)), of(Math.max(a, b))];
        expect(wide.count).toBeLessThanOrEqual(narrow.count);
        expect(wide.upperBound).toBeLessThanOrEqual(narrow.upperBound);
        expect(narrow.share).toBe(narrow.count / 400);
        expect(narrow.upperBound).toBeGreaterThanOrEqual(narrow.share);
        const { edgesPpm, counts } = narrow.histogram;
        expect(counts.reduce((sum, count) => sum + count, 0)).toBe(400);
        const width = Math.min(a, b);
        const outside = counts.filter(
          (_, i) => edgesPpm[i + 1]! <= -width || edgesPpm[i]! >= width,
        );
        expect(outside.reduce((sum, count) => sum + count, 0)).toBe(narrow.count);
      }),
    );
  });

  it('lets a unit conform that rounding keeps off the limit', () => {
    expect(tryLimits(Float64Array.of(-1, 3 + 4e-16, 5), { lowPpm: null, highPpm: 3 }).count).toBe(
      1,
    );
  });

  it('takes one limit, one unit, and refuses crossed limits', () => {
    expect(tryLimits(Float64Array.of(4), { lowPpm: null, highPpm: 3 })).toMatchObject({
      count: 1,
      share: 1,
      upperBound: 1,
    });
    expect(() => tryLimits(lot, { lowPpm: 3, highPpm: -3 })).toThrow(
      expect.objectContaining({ code: 'limits_crossed' }),
    );
  });
});
