import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  matchedFilterCurve,
  matchedFilterLoss,
  offsetForLoss,
  type Pulse,
  RadioError,
  symbolRateSinr,
} from '@shared/radio';

const rollOff = fc.double({ min: 0, max: 1, noNaN: true });
const pulse: fc.Arbitrary<Pulse> = fc.oneof(
  rollOff.map((value) => ({ shape: 'root-raised-cosine' as const, rollOff: value })),
  fc.constant({ shape: 'rectangular' as const }),
);
const offset = fc.double({ min: 0, max: 2.2, noNaN: true });

describe('matched-filter loss', () => {
  it('is symmetric in the offset', () => {
    fc.assert(
      fc.property(pulse, offset, (p, d) => {
        expect(matchedFilterLoss(p, -d)).toEqual(matchedFilterLoss(p, d));
      }),
    );
  });

  it('is nothing at no offset', () => {
    fc.assert(
      fc.property(pulse, (p) => {
        const loss = matchedFilterLoss(p, 0);
        expect(loss.correlationPeakPower).toBe(1);
        expect(loss.outputEnergyFraction).toBe(1);
        expect(loss.interferencePower).toBe(0);
        expect(loss.correlationPeakDb).toBe(0);
        expect(loss.signalToInterferenceDb).toBeNull();
      }),
    );
  });

  it('powers lie in [0, 1] and the samples hold the wanted symbol and its interference', () => {
    fc.assert(
      fc.property(pulse, offset, (p, d) => {
        const loss = matchedFilterLoss(p, d);
        for (const power of [
          loss.correlationPeakPower,
          loss.outputEnergyFraction,
          loss.symbolRatePower,
        ]) {
          expect(power).toBeGreaterThanOrEqual(0);
          expect(power).toBeLessThanOrEqual(1 + 1e-12);
        }
        expect(loss.symbolRatePower).toBeCloseTo(
          loss.correlationPeakPower + loss.interferencePower,
          14,
        );
        expect(loss.outputEnergyFraction).toBeGreaterThanOrEqual(loss.correlationPeakPower - 1e-12);
      }),
    );
  });

  it('only falls as the offset grows, and is gone from 1 + roll-off', () => {
    fc.assert(
      fc.property(rollOff, offset, offset, (a, d, e) => {
        const p: Pulse = { shape: 'root-raised-cosine', rollOff: a };
        const near = matchedFilterLoss(p, Math.min(d, e));
        const far = matchedFilterLoss(p, Math.max(d, e));
        expect(far.correlationPeakPower).toBeLessThanOrEqual(near.correlationPeakPower + 1e-12);
        expect(far.outputEnergyFraction).toBeLessThanOrEqual(near.outputEnergyFraction + 1e-12);
        const gone = matchedFilterLoss(p, 1 + a + d);
        expect(gone.correlationPeakPower).toBe(0);
        expect(gone.correlationPeakDb).toBeNull();
      }),
    );
  });

  // Closed forms: a = 0 gives (1-d)^2 and 1-d; a = 1 gives ((1-d/2) cos(pi d/2) + sin(pi d/2)/pi)^2.
  it('meets the closed forms at roll-off 0 and 1', () => {
    fc.assert(
      fc.property(fc.double({ min: 0, max: 0.999, noNaN: true }), (d) => {
        const sharp = matchedFilterLoss({ shape: 'root-raised-cosine', rollOff: 0 }, d);
        expect(sharp.correlationPeakPower).toBeCloseTo((1 - d) ** 2, 12);
        expect(sharp.outputEnergyFraction).toBeCloseTo(1 - d, 12);
        expect(sharp.interferencePower).toBeCloseTo(d * (1 - d), 12);
        const full = matchedFilterLoss({ shape: 'root-raised-cosine', rollOff: 1 }, d);
        const root =
          (1 - d / 2) * Math.cos((Math.PI * d) / 2) + Math.sin((Math.PI * d) / 2) / Math.PI;
        expect(full.correlationPeakPower).toBeCloseTo(root ** 2, 12);
      }),
    );
  });

  it('the offset found for a loss costs that loss', () => {
    fc.assert(
      fc.property(pulse, fc.double({ min: 0.01, max: 10, noNaN: true }), (p, lossDb) => {
        const d = offsetForLoss(p, lossDb);
        expect(matchedFilterLoss(p, d).correlationPeakDb).toBeCloseTo(-lossDb, 6);
      }),
    );
  });

  it('noise only adds to what is lost', () => {
    fc.assert(
      fc.property(
        rollOff,
        fc.double({ min: 0, max: 0.9, noNaN: true }),
        fc.double({ min: -5, max: 40, noNaN: true }),
        (a, d, esN0) => {
          const { sinrDb, degradationDb } = symbolRateSinr(
            { shape: 'root-raised-cosine', rollOff: a },
            d,
            esN0,
          );
          expect(sinrDb!).toBeLessThanOrEqual(esN0 + 1e-9);
          expect(degradationDb!).toBeGreaterThanOrEqual(-1e-9);
        },
      ),
    );
  });

  it('draws a curve point by point and refuses what is no pulse', () => {
    const curve = matchedFilterCurve({ shape: 'rectangular' }, [0, 0.15]);
    expect(curve.map((point) => point.offsetOverSymbolRate)).toEqual([0, 0.15]);
    expect(() => matchedFilterLoss({ shape: 'root-raised-cosine', rollOff: 1.2 }, 0)).toThrow(
      RadioError,
    );
    expect(() => matchedFilterLoss({ shape: 'rectangular' }, NaN)).toThrow(RadioError);
  });
});
