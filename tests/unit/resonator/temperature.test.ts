import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  atCutCurve,
  cubicOffsetPpm,
  curveStability,
  findActivityDips,
  fitCubic,
  forkOffsetPpm,
  inflectionC,
  offsetExtremes,
  readingStability,
  ResonatorError,
  turningPointsC,
} from '@shared/resonator';

const angle = fc.double({ min: -2, max: 8, noNaN: true });
const CHAMBER = [-40, -32, -24, -16, -8, 0, 8, 16, 24, 32, 40, 48, 56, 64, 72, 80];

/** A repeatable scatter of about one unit, the same in every run. */
const scatter = (i: number) => {
  const value = Math.sin(12.9898 * (i + 1)) * 43758.5453;
  return Math.sqrt(12) * (value - Math.floor(value) - 0.5);
};

const readings = (arcmin: number, noisePpm = 0.02) =>
  CHAMBER.map((t, i) => cubicOffsetPpm(atCutCurve(arcmin), t) + noisePpm * scatter(i));

describe('temperature curve', () => {
  it('is flat at its turning points and antisymmetric about its inflection', () => {
    fc.assert(
      fc.property(angle, fc.double({ min: 0, max: 60, noNaN: true }), (arcmin, step) => {
        const curve = atCutCurve(arcmin);
        for (const t of turningPointsC(curve)) {
          const slope = cubicOffsetPpm(curve, t + 1e-3) - cubicOffsetPpm(curve, t - 1e-3);
          expect(slope).toBeCloseTo(0, 9);
        }
        const middle = inflectionC(curve)!;
        const centre = cubicOffsetPpm(curve, middle);
        const up = cubicOffsetPpm(curve, middle + step) - centre;
        expect(centre - cubicOffsetPpm(curve, middle - step)).toBeCloseTo(up, 8);
      }),
    );
  });

  it('never leaves its extremes inside the range', () => {
    fc.assert(
      fc.property(angle, fc.double({ min: 0, max: 1, noNaN: true }), (arcmin, place) => {
        const curve = atCutCurve(arcmin);
        const { leastPpm, greatestPpm } = offsetExtremes(curve, -40, 85);
        const offset = cubicOffsetPpm(curve, -40 + 125 * place);
        expect(offset).toBeGreaterThanOrEqual(leastPpm - 1e-9);
        expect(offset).toBeLessThanOrEqual(greatestPpm + 1e-9);
      }),
    );
  });

  it('has no turning point where the slope never changes sign, one where it is a parabola', () => {
    const base = { referenceC: 25, offsetPpm: 0 };
    expect(turningPointsC({ ...base, a1PpmPerK: 1, a2PpmPerK2: 0, a3PpmPerK3: 1e-4 })).toEqual([]);
    expect(turningPointsC({ ...base, a1PpmPerK: 0, a2PpmPerK2: -0.03, a3PpmPerK3: 0 })).toEqual([
      25,
    ]);
    expect(inflectionC({ ...base, a1PpmPerK: 0, a2PpmPerK2: -0.03, a3PpmPerK3: 0 })).toBeNull();
  });

  it('moves up by what is added to every reading and by nothing else', () => {
    fc.assert(
      fc.property(angle, fc.integer({ min: -50, max: 50 }), (arcmin, added) => {
        const before = fitCubic(CHAMBER, readings(arcmin));
        const after = fitCubic(
          CHAMBER,
          readings(arcmin).map((y) => y + added),
        );
        expect(after.offsetPpm - before.offsetPpm).toBeCloseTo(added, 9);
        expect(after.a1PpmPerK).toBeCloseTo(before.a1PpmPerK, 10);
        expect(after.residualSdPpm!).toBeCloseTo(before.residualSdPpm!, 9);
      }),
    );
  });

  it('needs four different temperatures', () => {
    expect(() => fitCubic([0, 10, 20], [1, 2, 3])).toThrow(ResonatorError);
    expect(() => fitCubic([0, 0, 10, 20, 20], [1, 1, 2, 3, 3])).toThrow(ResonatorError);
    expect(() => fitCubic([25, 25, 25, 25], [1, 1, 2, 3])).toThrow(ResonatorError);
    expect(() => fitCubic([0, 10, 20, 30], [1, 2, 3])).toThrow(/as many values/);
    expect(() => fitCubic([0, 10, 20, 30], [1, 2, 3, NaN])).toThrow(/finite/);
  });
});

describe('stability over a temperature range', () => {
  it('differs by its reference, half the band being the least', () => {
    fc.assert(
      fc.property(angle, (arcmin) => {
        const stability = curveStability(atCutCurve(arcmin), -40, 85);
        expect(stability.halfBandPpm).toBeLessThanOrEqual(stability.fromReferencePpm + 1e-12);
        expect(stability.halfBandPpm).toBeLessThanOrEqual(stability.fromNominalPpm + 1e-12);
      }),
    );
  });

  it('only the reference to nominal feels a shift of the whole curve', () => {
    const curve = atCutCurve(3);
    const before = curveStability(curve, -30, 75);
    const after = curveStability({ ...curve, offsetPpm: 8 }, -30, 75);
    expect(after.fromReferencePpm).toBeCloseTo(before.fromReferencePpm, 12);
    expect(after.halfBandPpm).toBeCloseTo(before.halfBandPpm, 12);
    expect(after.fromNominalPpm).toBeCloseTo(8 + before.greatestPpm, 12);
  });

  it('of readings takes the one nearest to the reference temperature', () => {
    const stability = readingStability([-20, 24, 70], [-3, 1, 2], 25);
    expect(stability.referenceReadAtC).toBe(24);
    expect(stability).toMatchObject({ fromReferencePpm: 4, fromNominalPpm: 3, halfBandPpm: 2.5 });
  });

  it('refuses a crossed range', () => {
    expect(() => curveStability(atCutCurve(3), 85, -40)).toThrow(ResonatorError);
  });
});

describe('residual test for activity dips', () => {
  it('raises no alarm on a smooth curve, scattered or exact', () => {
    fc.assert(
      fc.property(angle, (arcmin) => {
        expect(findActivityDips(CHAMBER, readings(arcmin)).suspects).toEqual([]);
        expect(findActivityDips(CHAMBER, readings(arcmin, 0)).suspects).toEqual([]);
      }),
    );
  });

  it('finds the dip wherever it lies, and keeps it out of the curve', () => {
    fc.assert(
      fc.property(angle, fc.integer({ min: 1, max: CHAMBER.length - 2 }), (arcmin, place) => {
        const offsets = readings(arcmin).map((y, i) => (i === place ? y + 2 : y));
        const { suspects, curve } = findActivityDips(CHAMBER, offsets);
        expect(suspects.map(({ index, kind }) => [index, kind])).toEqual([[place, 'frequency']]);
        expect(suspects[0]!.residualPpm).toBeCloseTo(2, 0);
        expect(curve.residualSdPpm!).toBeLessThan(0.05);
      }),
    );
  });

  it('tells a dip from a stray reading by the resistance', () => {
    const offsets = readings(3).map((y, i) => (i === 6 ? y - 1.5 : y));
    const ohms = CHAMBER.map((_, i) => (i === 6 ? 60 : 20));
    const other = CHAMBER.map((_, i) => (i === 10 ? 60 : 20));
    expect(findActivityDips(CHAMBER, offsets, ohms).suspects).toMatchObject([
      { index: 6, kind: 'dip', resistanceRatio: 3 },
    ]);
    expect(findActivityDips(CHAMBER, offsets, other).suspects).toMatchObject([
      { index: 6, kind: 'frequency-only' },
      { index: 10, kind: 'resistance-only' },
    ]);
  });

  it('goes by the contractual limit where one is given', () => {
    const offsets = readings(3).map((y, i) => (i === 6 ? y - 0.5 : y));
    expect(findActivityDips(CHAMBER, offsets, null, { residualLimitPpm: 1 }).suspects).toEqual([]);
    expect(
      findActivityDips(CHAMBER, offsets, null, { residualLimitPpm: 0.3 }).suspects,
    ).toHaveLength(1);
  });

  it('needs seven readings', () => {
    expect(() => findActivityDips(CHAMBER.slice(0, 6), readings(3).slice(0, 6))).toThrow(
      ResonatorError,
    );
  });
});

describe('tuning fork', () => {
  it('is slow on either side of its turning point, alike', () => {
    fc.assert(
      fc.property(fc.double({ min: 0, max: 80, noNaN: true }), (t) => {
        expect(forkOffsetPpm(25 + t)).toBeCloseTo(forkOffsetPpm(25 - t), 9);
        expect(forkOffsetPpm(25 + t)).toBeLessThanOrEqual(0);
      }),
    );
  });
});
