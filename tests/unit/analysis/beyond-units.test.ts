import { describe, expect, it } from 'vitest';
import fc from 'fast-check';
import {
  type Bounds,
  countBeyondBounds,
  farthestBeyond,
  isBeyond,
  MOST_LISTED,
} from '@shared/analysis/beyond-units';
import { settledOnLimits } from '@shared/analysis/on-limits';

const limits: Bounds = { lowPpm: -10, highPpm: 10 };
const listed = (offsets: readonly number[], ...bounds: Bounds[]) => {
  const values = Float64Array.from(offsets);
  return farthestBeyond(values, values.slice().sort(), bounds);
};

describe('units beyond', () => {
  it('takes a unit on a limit as conforming, on either side', () => {
    expect([-10, 10, 0].map((offset) => isBeyond(offset, limits))).toEqual([false, false, false]);
    expect([-10.0001, 10.0001].map((offset) => isBeyond(offset, limits))).toEqual([true, true]);
    expect(countBeyondBounds(Float64Array.of(-10, -10, 0, 10), limits)).toBe(0);
    expect(countBeyondBounds(Float64Array.of(-11, -10, 10, 10.5, 12), limits)).toBe(3);
  });

  it('knows one limit only', () => {
    const upper = { lowPpm: null, highPpm: 5 };
    expect(countBeyondBounds(Float64Array.of(-100, 5, 6), upper)).toBe(1);
    expect(listed([-100, 5, 6, 9], upper)).toEqual({ indices: [3, 2], truncated: false });
    expect(listed([-100, 5, 6], { lowPpm: -5, highPpm: null }).indices).toEqual([0]);
  });

  it('names the farthest first, of equally far ones the first to come', () => {
    expect(listed([11, 3, -14, -11, 12], limits)).toEqual({
      indices: [2, 4, 0, 3],
      truncated: false,
    });
    expect(listed([1, 2], limits)).toEqual({ indices: [], truncated: false });
    expect(listed([], limits)).toEqual({ indices: [], truncated: false });
  });

  it('lists every unit when the allowance is used up', () => {
    expect(listed([0.5, -2, 0, 1], limits, { lowPpm: 0, highPpm: 0 }).indices).toEqual([1, 3, 0]);
  });

  it('says when it lists not all, and then lists as many as it may', () => {
    const many = Array.from({ length: MOST_LISTED + 3 }, () => 11);
    expect(listed(many, limits)).toEqual({
      indices: Array.from({ length: MOST_LISTED }, (_, i) => i),
      truncated: true,
    });
    expect(listed(many.slice(3), limits).truncated).toBe(false);
    const spread = Array.from({ length: 2000 }, (_, i) => (i % 2 ? 20 + i : -20 - i));
    expect(listed(spread, limits).indices).toEqual(
      Array.from({ length: MOST_LISTED }, (_, i) => 1999 - i),
    );
  });

  it('lists exactly what is beyond any of the bounds', () => {
    const offset = fc.integer({ min: -15, max: 15 });
    const bounds = fc
      .tuple(fc.integer({ min: -12, max: 0 }), fc.integer({ min: 0, max: 12 }))
      .map(([lowPpm, highPpm]): Bounds => ({ lowPpm, highPpm }));
    fc.assert(
      fc.property(fc.array(offset, { maxLength: 40 }), bounds, bounds, (offsets, a, b) => {
        const { indices } = listed(offsets, a, b);
        const expected = offsets.flatMap((o, i) => (isBeyond(o, a) || isBeyond(o, b) ? [i] : []));
        expect([...indices].sort((x, y) => x - y)).toEqual(expected);
        const low = Math.max(a.lowPpm!, b.lowPpm!);
        const high = Math.min(a.highPpm!, b.highPpm!);
        const excess = indices.map((i) => Math.max(low - offsets[i]!, offsets[i]! - high));
        expect(excess).toEqual([...excess].sort((x, y) => y - x));
      }),
    );
  });
});

describe('units that rounding keeps off a limit', () => {
  it('are put onto it, others left', () => {
    const offsets = Float64Array.of(10 + 2e-15, -10 - 5e-10, 10 + 2e-9, 9.5, -10);
    expect([...settledOnLimits(offsets, limits)]).toEqual([10, -10, 10 + 2e-9, 9.5, -10]);
    expect(offsets[0]).not.toBe(10);
  });

  it('cost no copy when there is none', () => {
    const offsets = Float64Array.of(1, 10, -10);
    expect(settledOnLimits(offsets, limits)).toBe(offsets);
    expect(settledOnLimits(offsets, { lowPpm: null, highPpm: 3 })).toBe(offsets);
  });
});
