import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  driveDependence,
  loadResonance,
  offsetAtLoadPpm,
  offsetByTrimSensitivityPpm,
  pullingPpm,
  ResonatorError,
} from '@shared/resonator';

const crystal = fc.record({
  seriesHz: fc.double({ min: 32_768, max: 2e8, noNaN: true }),
  motionalCapacitanceFf: fc.double({ min: 1, max: 30, noNaN: true }),
  shuntCapacitancePf: fc.double({ min: 0.5, max: 7, noNaN: true }),
  motionalResistanceOhm: fc.double({ min: 5, max: 70_000, noNaN: true }),
});
const load = fc.double({ min: 5, max: 40, noNaN: true });
const offset = fc.double({ min: -100, max: 100, noNaN: true });

describe('readings taken at another load', () => {
  it('there and back is where it was, and over a third load is the straight way', () => {
    fc.assert(
      fc.property(crystal, offset, load, load, load, (unit, y, a, b, c) => {
        const atB = offsetAtLoadPpm(y, unit, a, b);
        expect(offsetAtLoadPpm(atB, unit, b, a)).toBeCloseTo(y, 8);
        expect(offsetAtLoadPpm(atB, unit, b, c)).toBeCloseTo(offsetAtLoadPpm(y, unit, a, c), 8);
      }),
    );
  });

  it('is the difference of the load resonance frequencies themselves', () => {
    fc.assert(
      fc.property(crystal, load, load, (unit, a, b) => {
        const atA = loadResonance(unit, a).loadHz;
        const atB = loadResonance(unit, b).loadHz;
        // A unit adjusted to nominal at load a reads this at load b.
        expect(offsetAtLoadPpm(0, unit, a, b)).toBeCloseTo((atB / atA - 1) * 1e6, 6);
      }),
    );
  });

  it('agrees with pulling and with the trim sensitivity where those hold', () => {
    fc.assert(
      fc.property(
        crystal,
        load,
        fc.double({ min: -0.05, max: 0.05, noNaN: true }),
        (unit, a, change) => {
          const exact = offsetAtLoadPpm(0, unit, a, a + change);
          const { trimSensitivityPpmPerPf, loadOffsetPpm } = loadResonance(unit, a);
          const bend = 1e-3 * Math.abs(exact) + (loadOffsetPpm / 1e6) * Math.abs(exact) + 1e-9;
          expect(Math.abs(pullingPpm(unit, a, a + change) - exact)).toBeLessThanOrEqual(4 * bend);
          const straight = offsetByTrimSensitivityPpm(0, trimSensitivityPpmPerPf, change);
          expect(Math.abs(straight - exact)).toBeLessThanOrEqual(20 * bend);
        },
      ),
    );
  });

  it('more load is always slower, and resists less', () => {
    fc.assert(
      fc.property(crystal, load, fc.double({ min: 0.1, max: 10, noNaN: true }), (unit, a, more) => {
        const before = loadResonance(unit, a);
        const after = loadResonance(unit, a + more);
        expect(after.loadOffsetPpm).toBeLessThan(before.loadOffsetPpm);
        expect(after.loadResistanceOhm).toBeLessThan(before.loadResistanceOhm);
        expect(before.trimSensitivityPpmPerPf).toBeLessThan(0);
      }),
    );
  });

  it('names the argument that is wrong', () => {
    const unit = { motionalCapacitanceFf: 10, shuntCapacitancePf: 3 };
    expect(() => offsetAtLoadPpm(0, unit, 0, 12)).toThrow(/readAtLoadPf/);
    expect(() => offsetAtLoadPpm(NaN, unit, 10, 12)).toThrow(ResonatorError);
    expect(() => pullingPpm({ ...unit, motionalCapacitanceFf: -1 }, 10, 12)).toThrow(/motional/);
  });
});

describe('drive level dependence', () => {
  it('does not depend on the order of the sweep', () => {
    const drive = [0.01, 1, 100];
    const up = driveDependence(drive, [50, 22, 20], [0, 0.1, 0.4], 2);
    const down = driveDependence([...drive].reverse(), [20, 22, 50], [0.4, 0.1, 0], 2);
    expect(up).toEqual(down);
    expect(up).toMatchObject({
      ratioMaxToMin: 2.5,
      ratioLowestDriveToNominal: 2.5,
      withinRatioLimit: false,
    });
  });

  it('refuses a sweep of one level or of no resistance', () => {
    expect(() => driveDependence([1, 1], [20, 21], [0, 0], 2)).toThrow(ResonatorError);
    expect(() => driveDependence([1, 2], [0, 21], [0, 0], 2)).toThrow(/resistanceOhm/);
  });
});
