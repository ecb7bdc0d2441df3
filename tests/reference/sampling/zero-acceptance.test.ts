import { describe, expect, it } from 'vitest';
import fc from 'fast-check';
import { zeroAcceptanceSample } from '@shared/sampling/zero-acceptance';
import { hypergeometricProbability } from '@shared/statistics/distributions/hypergeometric';
import cases from '../data/sampling/zero-acceptance.json';

describe('zero-acceptance sample sizes', () => {
  it.each(cases)('$id', ({ input, expected }) => {
    const { sampleSize } = zeroAcceptanceSample(input.lot, input.ltpd, input.beta);
    expect(sampleSize).toBe(expected);
  });

  it('are the smallest that keep the risk', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 1, max: 5000 }),
        fc.double({ min: 0.001, max: 0.5, noNaN: true }),
        fc.double({ min: 0.001, max: 0.5, noNaN: true }),
        (lot, share, risk) => {
          const { sampleSize, limitingUnits, consumersRiskReached } = zeroAcceptanceSample(
            lot,
            share,
            risk,
          );
          expect(consumersRiskReached).toBeLessThanOrEqual(risk * (1 + 1e-9));
          expect(sampleSize).toBeLessThanOrEqual(lot);
          if (sampleSize > 1)
            expect(
              hypergeometricProbability(0, lot, limitingUnits, sampleSize - 1),
            ).toBeGreaterThan(risk);
        },
      ),
    );
  });

  it('takes the risk reached exactly as reached: 45 of 50 units for one bad unit at 10 %', () => {
    // C(49, 45)/C(50, 45) = 5/50
    expect(zeroAcceptanceSample(50, 0.02, 0.1).sampleSize).toBe(45);
  });

  it('names an argument out of range', () => {
    expect(() => zeroAcceptanceSample(0, 0.1, 0.1)).toThrow(/lotSize/);
    expect(() => zeroAcceptanceSample(50, 1, 0.1)).toThrow(/limitingShare/);
    expect(() => zeroAcceptanceSample(50, 0.1, 0)).toThrow(/consumersRisk/);
  });
});
