import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { frequencyBudget, rectangularSumBeyond, RadioError } from '@shared/radio';

const width = fc.integer({ min: 1, max: 4000 }).map((v) => v / 100);

describe('convolution of rectangular contributions', () => {
  it('one contribution leaves the limit in proportion', () => {
    expect(rectangularSumBeyond([10], 7.5)).toBe(0.25);
  });

  it('two equal contributions make a triangle', () => {
    fc.assert(
      fc.property(width, fc.double({ min: 0, max: 1, noNaN: true }), (a, share) => {
        const limit = Number((2 * a * share).toPrecision(6));
        const expected = limit >= 2 * a ? 0 : (1 - limit / (2 * a)) ** 2;
        expect(rectangularSumBeyond([a, a], limit)).toBeCloseTo(expected, 12);
      }),
    );
  });

  it('is a probability, falls with the limit, is one at zero and zero at the worst case', () => {
    fc.assert(
      fc.property(fc.array(width, { minLength: 1, maxLength: 7 }), width, width, (widths, a, b) => {
        const low = rectangularSumBeyond(widths, Math.min(a, b));
        const high = rectangularSumBeyond(widths, Math.max(a, b));
        expect(low).toBeGreaterThanOrEqual(high);
        expect(high).toBeGreaterThanOrEqual(0);
        expect(low).toBeLessThanOrEqual(1);
        expect(rectangularSumBeyond(widths, 0)).toBe(1);
        expect(rectangularSumBeyond(widths, widths.reduce((s, w) => s + w, 0) + 1e-6)).toBe(0);
      }),
    );
  });

  it('scales: widths and limit times ten leave the share', () => {
    fc.assert(
      fc.property(
        fc.array(fc.integer({ min: 1, max: 50 }), { minLength: 1, maxLength: 6 }),
        fc.integer({ min: 0, max: 100 }),
        (w, limit) => {
          expect(
            rectangularSumBeyond(
              w.map((v) => 10 * v),
              10 * limit,
            ),
          ).toBe(rectangularSumBeyond(w, limit));
        },
      ),
    );
  });

  it('a contribution of no width changes nothing, a very narrow one next to nothing', () => {
    expect(rectangularSumBeyond([20, 0, 10], 25)).toBe(rectangularSumBeyond([20, 10], 25));
    expect(rectangularSumBeyond([20, 1e-9, 10], 25)).toBeCloseTo(
      rectangularSumBeyond([20, 10], 25),
      12,
    );
  });
});

describe('frequency budget', () => {
  it('worst case is never below root-sum-square, and margins are what remains', () => {
    fc.assert(
      fc.property(fc.array(width, { minLength: 1, maxLength: 7 }), width, (widths, allowance) => {
        const budget = frequencyBudget(
          widths.map((halfWidthPpm) => ({ kind: 'supply', halfWidthPpm })),
          allowance,
        );
        expect(budget.worstCasePpm).toBeGreaterThanOrEqual(budget.rootSumSquarePpm * (1 - 1e-12));
        expect(budget.marginPpm.worstCase).toBeCloseTo(allowance - budget.worstCasePpm, 9);
        if (budget.marginPpm.worstCase > 1e-9) expect(budget.shareBeyondAllowance).toBe(0);
      }),
    );
  });

  it('names what is wrong', () => {
    expect(() => frequencyBudget([], 10)).toThrow(RadioError);
    expect(() => frequencyBudget([{ kind: 'ageing', halfWidthPpm: -1 }], 10)).toThrow(/ageing/);
    expect(() => rectangularSumBeyond(new Array(13).fill(1), 3)).toThrow(RadioError);
  });
});
