import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  ageingOffsetPpm,
  assessAgeing,
  fitLinearDrift,
  fitLogarithmicAgeing,
  fitLogLinearAgeing,
  type LogarithmicAgeing,
  logarithmicOffsetPpm,
  projectAgeing,
  projectAgeingYears,
  ResonatorError,
} from '@shared/resonator';

const DAYS = Array.from({ length: 30 }, (_, i) => 2 * (i + 1));

/** A repeatable scatter of about one unit, the same in every run. */
const scatter = (i: number) => {
  const value = Math.sin(12.9898 * (i + 1)) * 43758.5453;
  return Math.sqrt(12) * (value - Math.floor(value) - 0.5);
};

const law = fc.record({
  amplitudePpm: fc.double({ min: 0.05, max: 2, noNaN: true }),
  ratePerDay: fc.double({ min: 0.05, max: 1, noNaN: true }),
  startPpm: fc.double({ min: -20, max: 20, noNaN: true }),
});

function determined(days: number[], offsetsPpm: number[]): LogarithmicAgeing {
  const fit = fitLogarithmicAgeing(days, offsetsPpm);
  if (fit.state !== 'determined') throw new Error(fit.explanation);
  return fit;
}

describe('logarithmic ageing', () => {
  it('returns the law that made the readings', () => {
    fc.assert(
      fc.property(law, (truth) => {
        const fit = determined(
          DAYS,
          DAYS.map((t) => logarithmicOffsetPpm(truth, t)),
        );
        expect(fit.amplitudePpm / truth.amplitudePpm).toBeCloseTo(1, 5);
        expect(fit.ratePerDay / truth.ratePerDay).toBeCloseTo(1, 5);
        expect(fit.startPpm).toBeCloseTo(truth.startPpm, 5);
      }),
    );
  });

  it('moves with the readings and turns over with their sign', () => {
    fc.assert(
      fc.property(law, fc.integer({ min: -30, max: 30 }), (truth, added) => {
        const y = DAYS.map((t, i) => logarithmicOffsetPpm(truth, t) + 0.001 * scatter(i));
        const fit = determined(DAYS, y);
        const moved = determined(
          DAYS,
          y.map((v) => added - v),
        );
        expect(moved.amplitudePpm).toBeCloseTo(-fit.amplitudePpm, 6);
        expect(moved.ratePerDay).toBeCloseTo(fit.ratePerDay, 6);
        expect(moved.startPpm).toBeCloseTo(added - fit.startPpm, 6);
      }),
    );
  });

  it.each([
    ['too-few-readings', [2, 4, 6, 6], (t: number) => Math.log(t)],
    ['no-trend', DAYS, (_t: number, i: number) => 0.01 * scatter(i)],
    ['no-trend', DAYS, () => 3.25],
    ['like-a-line', DAYS, (t: number, i: number) => 0.01 * t + 0.01 * scatter(i)],
    ['like-a-line', DAYS, (t: number) => 0.01 * t],
    ['only-slope-in-log-time', DAYS, (t: number, i: number) => Math.log(t) + 0.01 * scatter(i)],
  ] as const)('says "%s" instead of numbers', (reason, days, offset) => {
    const fit = fitLogarithmicAgeing(
      [...days],
      days.map((t, i) => offset(t, i)),
    );
    expect(fit).toMatchObject({ state: 'not-determined', reason });
    expect(fit).not.toHaveProperty('amplitudePpm');
  });
});

describe('projection', () => {
  it('widens with time and never promises more than the scatter of a reading', () => {
    fc.assert(
      fc.property(law, (truth) => {
        const fit = determined(
          DAYS,
          DAYS.map((t, i) => logarithmicOffsetPpm(truth, t) + 0.002 * scatter(i)),
        );
        const one = projectAgeingYears(fit, 1);
        const ten = projectAgeingYears(fit, 10);
        expect(ten.halfWidth95Ppm).toBeGreaterThan(one.halfWidth95Ppm);
        expect(one.halfWidth95Ppm).toBeGreaterThan(fit.residualSdPpm);
        expect(ten.spansBeyond).toBeCloseTo(3652.5 / 60, 9);
        expect(ten.warning).toMatch(/guide, not as a limit/);
      }),
    );
  });

  it('changes from the last reading are changes from the start less what has happened', () => {
    const fit = fitLinearDrift([0, 7, 14, 21], [0.1, 0.21, 0.3, 0.42]);
    const at = projectAgeing(fit, 100);
    expect(at.changeFromStartPpm! - at.changeFromLastReadingPpm).toBeCloseTo(
      21 * fit.driftPpmPerDay,
      12,
    );
    expect(ageingOffsetPpm(fit, 0)).toBe(fit.interceptPpm);
    expect(
      projectAgeing(fitLogLinearAgeing([1, 3, 9], [1, 2, 3.1]), 100).changeFromStartPpm,
    ).toBeNull();
  });
});

describe('assessment of one unit', () => {
  it('projects by the logarithmic law where the readings bear it', () => {
    const y = DAYS.map(
      (t, i) =>
        logarithmicOffsetPpm({ amplitudePpm: 0.4, ratePerDay: 0.2, startPpm: 1 }, t) +
        0.002 * scatter(i),
    );
    const assessment = assessAgeing(DAYS, y);
    expect(assessment.projectedBy).toBe('logarithmic');
    expect(assessment.tenYears!.atDay).toBe(3652.5);
  });

  it('falls back on the log-linear law where only that slope is known', () => {
    const y = DAYS.map((t, i) => Math.log(t) + 0.01 * scatter(i));
    expect(assessAgeing(DAYS, y).projectedBy).toBe('log-linear');
  });

  it('never projects a straight line or no trend', () => {
    const line = assessAgeing(
      DAYS,
      DAYS.map((t, i) => 0.01 * t + 0.01 * scatter(i)),
    );
    expect(line).toMatchObject({ projectedBy: null, oneYear: null, tenYears: null });
    expect(line.linear!.driftPpmPerDay).toBeCloseTo(0.01, 3);
    expect(assessAgeing([5], [1])).toMatchObject({
      projectedBy: null,
      linear: null,
      logLinear: null,
    });
  });

  it('a reading at day zero has no place in logarithmic time', () => {
    const days = [0, ...DAYS];
    const y = days.map((t) =>
      logarithmicOffsetPpm({ amplitudePpm: 0.4, ratePerDay: 0.2, startPpm: 1 }, t),
    );
    const assessment = assessAgeing(days, y);
    expect(assessment.logLinear).toBeNull();
    expect(assessment.projectedBy).toBe('logarithmic');
  });

  it('names what is wrong', () => {
    expect(() => assessAgeing([], [])).toThrow(ResonatorError);
    expect(() => assessAgeing([1, 2], [1])).toThrow(/as many values/);
    expect(() => fitLogLinearAgeing([0, 1, 2], [1, 2, 3])).toThrow(/days/);
    expect(() => fitLinearDrift([3, 3, 3], [1, 2, 3])).toThrow(ResonatorError);
    expect(() => projectAgeingYears(fitLinearDrift([1, 2, 3], [1, 2, 3]), 0)).toThrow(/years/);
  });
});
