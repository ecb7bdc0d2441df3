import { type z } from 'zod';
import { type TimeFinding } from '../contract/analysis';
import { assessAgeing } from '../resonator/ageing/assessment';
import { allanDeviation, octaveFactors, phaseFromFrequency } from '../resonator/stability';
import { type UnitSeries } from './units';

type TimeView = z.infer<typeof TimeFinding>;

const MOST_POINTS = 1500;
const DAY_MS = 86_400_000;
/** Stabilisation before the first reading that may count for ageing, days; and the least span that says anything (MIL-PRF-55310 asks for 30). */
const LEAST_AGEING_DAYS = 7;

/** One unit over time: the drawn series, ageing by the law the readings bear, Allan deviation where they are evenly spaced. */
export function describeTime(series: UnitSeries, serial: string): TimeView {
  const { timesMs, offsetsPpm } = series;
  const startMs = timesMs[0]!;
  const elapsedS = timesMs.map((t) => (t - startMs) / 1000);
  return {
    serial,
    readingsCount: timesMs.length,
    spanS: elapsedS.at(-1)!,
    series: thin(elapsedS, offsetsPpm),
    ageing: ageingOf(series),
    allanDeviation: allanOf(elapsedS, offsetsPpm),
  };
}

function ageingOf({ timesMs, offsetsPpm }: UnitSeries): TimeView['ageing'] {
  const none = {
    oneYearPpm: null,
    oneYearHalfWidthPpm: null,
    tenYearsPpm: null,
    tenYearsHalfWidthPpm: null,
  };
  const spanDays = (timesMs.at(-1)! - timesMs[0]!) / DAY_MS;
  if (spanDays < LEAST_AGEING_DAYS) {
    return {
      model: 'not_determined',
      ...none,
      note: `Not determined: the readings span less than ${LEAST_AGEING_DAYS} days.`,
    };
  }
  // One mean a day: readings of one day share the day's temperature and say nothing more of ageing.
  const days = new Map<number, { sum: number; count: number }>();
  timesMs.forEach((t, i) => {
    const day = Math.floor((t - timesMs[0]!) / DAY_MS);
    const there = days.get(day) ?? { sum: 0, count: 0 };
    days.set(day, { sum: there.sum + offsetsPpm[i]!, count: there.count + 1 });
  });
  const at = [...days.keys()].map((day) => day + 0.5);
  const assessed = assessAgeing(
    at,
    [...days.values()].map(({ sum, count }) => sum / count),
  );
  if (!assessed.projectedBy || !assessed.oneYear || !assessed.tenYears) {
    return {
      model: 'not_determined',
      ...none,
      note: 'Not determined: the readings cannot tell a logarithmic course from a straight line; measure longer.',
    };
  }
  const models = {
    logarithmic: 'logarithmic',
    'log-linear': 'log_linear',
    linear: 'linear',
  } as const;
  const { oneYear, tenYears } = assessed;
  return {
    model: models[assessed.projectedBy],
    oneYearPpm: oneYear.changeFromLastReadingPpm,
    oneYearHalfWidthPpm: oneYear.halfWidth95Ppm,
    tenYearsPpm: tenYears.changeFromLastReadingPpm,
    tenYearsHalfWidthPpm: tenYears.halfWidth95Ppm,
    note: oneYear.warning,
  };
}

/** Needs even spacing: a gap would be read as stillness. */
function allanOf(
  elapsedS: readonly number[],
  offsetsPpm: readonly number[],
): TimeView['allanDeviation'] {
  const tau0S = (elapsedS.at(-1)! - elapsedS[0]!) / (elapsedS.length - 1);
  const even = tau0S > 0 && elapsedS.every((t, i) => Math.abs(t - i * tau0S) < 0.25 * tau0S);
  if (!even) return [];
  const phaseS = phaseFromFrequency(
    Float64Array.from(offsetsPpm, (ppm) => ppm * 1e-6),
    tau0S,
  );
  return octaveFactors(phaseS.length).map((m) => ({
    tauS: m * tau0S,
    overlapping: allanDeviation(phaseS, tau0S, m).deviation,
    plain: phaseS.length >= 3 * m + 1 ? allanDeviation(phaseS, tau0S, m, 'plain').deviation : null,
  }));
}

/** Lowest and highest of each stretch, so that no excursion is lost in the drawing. */
function thin(elapsedS: readonly number[], offsetsPpm: readonly number[]): [number, number][] {
  const n = elapsedS.length;
  if (n <= MOST_POINTS) return elapsedS.map((t, i) => [t, offsetsPpm[i]!]);
  const stretches = MOST_POINTS / 2;
  const points: [number, number][] = [];
  for (let s = 0; s < stretches; s += 1) {
    const from = Math.floor((s * n) / stretches);
    const to = Math.floor(((s + 1) * n) / stretches);
    let low = from;
    let high = from;
    for (let i = from; i < to; i += 1) {
      if (offsetsPpm[i]! < offsetsPpm[low]!) low = i;
      if (offsetsPpm[i]! > offsetsPpm[high]!) high = i;
    }
    for (const i of low === high ? [low] : [Math.min(low, high), Math.max(low, high)])
      points.push([elapsedS[i]!, offsetsPpm[i]!]);
  }
  return points;
}
