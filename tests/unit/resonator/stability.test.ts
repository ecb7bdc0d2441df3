import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  allanDeviation,
  type AllanKind,
  octaveFactors,
  phaseFromFrequency,
  ResonatorError,
  timeDeviation,
} from '@shared/resonator';

const KINDS: AllanKind[] = ['plain', 'overlapping', 'modified'];
const series = fc.array(fc.integer({ min: -1000, max: 1000 }), { minLength: 12, maxLength: 60 });

describe('Allan deviation', () => {
  it('does not feel a constant offset of frequency', () => {
    fc.assert(
      fc.property(
        series,
        fc.constantFrom(...KINDS),
        fc.integer({ min: 1, max: 4 }),
        (y, kind, m) => {
          const before = allanDeviation(phaseFromFrequency(y, 1), 1, m, kind).deviation;
          const after = allanDeviation(
            phaseFromFrequency(
              y.map((v) => v + 5000),
              1,
            ),
            1,
            m,
            kind,
          ).deviation;
          expect(after).toBeCloseTo(before, 6);
        },
      ),
    );
  });

  it('scales with the series and turns over with nothing', () => {
    fc.assert(
      fc.property(series, fc.constantFrom(...KINDS), (y, kind) => {
        const once = allanDeviation(phaseFromFrequency(y, 2), 2, 2, kind).deviation;
        const thrice = allanDeviation(
          phaseFromFrequency(
            y.map((v) => -3 * v),
            2,
          ),
          2,
          2,
          kind,
        ).deviation;
        expect(thrice).toBeCloseTo(3 * once, 6);
      }),
    );
  });

  it('is the same for every kind at the shortest averaging time', () => {
    fc.assert(
      fc.property(series, (y) => {
        const phase = phaseFromFrequency(y, 1);
        const [plain, overlapping, modified] = KINDS.map((kind) =>
          allanDeviation(phase, 1, 1, kind),
        );
        expect(overlapping).toEqual(plain);
        expect(modified!.deviation).toBeCloseTo(plain!.deviation, 9);
        expect(timeDeviation(phase, 1, 1)).toBeCloseTo(plain!.deviation / Math.sqrt(3), 9);
      }),
    );
  });

  it('of linear drift D is D tau / sqrt 2', () => {
    const phase = phaseFromFrequency(
      Array.from({ length: 400 }, (_, k) => 1e-12 * k),
      1,
    );
    for (const m of octaveFactors(phase.length)) {
      const { deviation, averagingTimeS } = allanDeviation(phase, 1, m);
      expect(deviation / ((1e-12 * averagingTimeS) / Math.SQRT2)).toBeCloseTo(1, 9);
    }
  });

  it('octaves leave every kind enough to work on', () => {
    fc.assert(
      fc.property(fc.integer({ min: 4, max: 5000 }), (count) => {
        const phase = new Float64Array(count);
        for (const m of octaveFactors(count)) {
          for (const kind of KINDS)
            expect(allanDeviation(phase, 1, m, kind).terms).toBeGreaterThan(0);
        }
      }),
    );
  });

  it('names what is wrong', () => {
    const phase = phaseFromFrequency([1, 2, 3, 4], 1);
    expect(() => allanDeviation(phase, 1, 3)).toThrow(/at least 7 values/);
    expect(() => allanDeviation(phase, 1, 1.5)).toThrow(ResonatorError);
    expect(() => allanDeviation(phase, 0, 1)).toThrow(/tau0S/);
    expect(() => phaseFromFrequency([1], 1)).toThrow(ResonatorError);
    expect(() => phaseFromFrequency([1, NaN], 1)).toThrow(/finite/);
  });
});
