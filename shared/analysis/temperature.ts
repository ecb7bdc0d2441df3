import { type z } from 'zod';
import { type TemperatureFinding } from '../contract/analysis';
import { type PartCriteria } from '../contract/parts';
import { cubicOffsetPpm, fitCubic, turningPointsC } from '../resonator/cubic';
import { findActivityDips } from '../resonator/activity-dips';
import {
  curveStability,
  readingStability,
  type TemperatureStability,
} from '../resonator/temperature-stability';
import { median } from '../statistics/quantiles';
import { type TemperatureReadings, type UnitCurve } from './units';

type TemperatureView = z.infer<typeof TemperatureFinding>;

/** A cubic through as many points as it has coefficients says nothing of its own; one more leaves a residual. */
const LEAST_FOR_CUBIC = 5;
const LEAST_FOR_DIPS = 7;

const distinct = (values: readonly number[]) => new Set(values).size;

function fitted({ temperaturesC, offsetsPpm }: UnitCurve, referenceC: number) {
  return distinct(temperaturesC) >= LEAST_FOR_CUBIC
    ? fitCubic(temperaturesC, offsetsPpm, referenceC)
    : null;
}

/** By the fitted curve over the part's range where there is one to fit, else by the readings themselves. */
function stabilityOf(curve: UnitCurve, part: PartCriteria): TemperatureStability {
  const fit = fitted(curve, part.referenceTemperatureC);
  if (fit && part.temperatureLowC !== null && part.temperatureHighC !== null) {
    const read = readingStability(
      curve.temperaturesC,
      curve.offsetsPpm,
      part.referenceTemperatureC,
    );
    const drawn = curveStability(fit, part.temperatureLowC, part.temperatureHighC);
    // A dip between the smooth curve's extremes counts too: the worse of both is said.
    return {
      ...drawn,
      fromReferencePpm: Math.max(read.fromReferencePpm, drawn.fromReferencePpm),
      fromNominalPpm: Math.max(read.fromNominalPpm, drawn.fromNominalPpm),
      halfBandPpm: Math.max(read.halfBandPpm, drawn.halfBandPpm),
    };
  }
  return readingStability(curve.temperaturesC, curve.offsetsPpm, part.referenceTemperatureC);
}

function referred(
  stability: TemperatureStability,
  reference: PartCriteria['stabilityReference'],
): number {
  if (reference === 'nominal') return stability.fromNominalPpm;
  return reference === 'middle_of_band' ? stability.halfBandPpm : stability.fromReferencePpm;
}

/** How the units move with temperature: band, stability by its three references, turning points, suspected activity dips. */
export function describeTemperature(
  readings: TemperatureReadings,
  part: PartCriteria,
  serialOf: (curve: UnitCurve) => string,
): TemperatureView {
  const stabilities = readings.everyCurve.map((curve) => stabilityOf(curve, part));
  const worst = (pick: (s: TemperatureStability) => number) =>
    stabilities.reduce((most, s) => Math.max(most, pick(s)), 0);
  const temperaturesC = [...readings.byTemperature.keys()].sort((a, b) => a - b);
  const fits = readings.everyCurve.map((curve) => fitted(curve, part.referenceTemperatureC));
  const turning = fits
    .flatMap((fit) => (fit ? turningPointsC(fit) : []))
    .filter((t) => t > -100 && t < 200);
  const notes: string[] = [];
  if (fits.every((fit) => fit === null))
    notes.push(
      `A cubic needs ${LEAST_FOR_CUBIC} temperatures a unit; the figures here are the readings’ own.`,
    );
  const dips = readings.everyCurve.flatMap((curve) => {
    if (distinct(curve.temperaturesC) < LEAST_FOR_DIPS) return [];
    return findActivityDips(curve.temperaturesC, curve.offsetsPpm, curve.resistancesOhm)
      .suspects.filter(({ kind }) => kind === 'dip' || kind === 'frequency')
      .map(({ temperatureC, residualPpm }) => ({
        serial: serialOf(curve),
        temperatureC,
        residualPpm,
      }));
  });
  if (dips.length > 0 && readings.everyCurve.some((curve) => curve.resistancesOhm === null)) {
    notes.push(
      'Resistance was not read: a step in frequency alone may be an activity dip or a reading error.',
    );
  }
  return {
    unitsCount: readings.unitsCount,
    temperaturesC,
    curves: readings.curves.map((curve) => ({
      serial: serialOf(curve),
      points: curve.temperaturesC.map((t, i): [number, number] => [t, curve.offsetsPpm[i]!]),
      fitted: drawCurve(curve, part.referenceTemperatureC),
    })),
    band: temperaturesC.map((temperatureC) => {
      const offsets = Float64Array.from(readings.byTemperature.get(temperatureC)!).sort();
      return {
        temperatureC,
        lowPpm: offsets[0]!,
        medianPpm: median(offsets),
        highPpm: offsets.at(-1)!,
      };
    }),
    stability: {
      referenceTemperaturePpm: worst((s) => s.fromReferencePpm),
      nominalPpm: worst((s) => s.fromNominalPpm),
      middleOfBandPpm: worst((s) => s.halfBandPpm),
      limitPpm: part.stabilityPpm,
      unitsBeyond:
        part.stabilityPpm === null
          ? 0
          : stabilities.filter((s) => referred(s, part.stabilityReference) > part.stabilityPpm!)
              .length,
    },
    turningPointsC: summarise(turning),
    activityDips: dips.slice(0, 200),
    notes,
  };
}

/** Lower and upper turning point, each as the median over the units. */
function summarise(turning: number[]): number[] {
  if (turning.length === 0) return [];
  const sorted = Float64Array.from(turning).sort();
  const middle = (sorted[0]! + sorted.at(-1)!) / 2;
  return [sorted.filter((t) => t <= middle), sorted.filter((t) => t > middle)]
    .filter((part) => part.length > 0)
    .map(median);
}

function drawCurve(curve: UnitCurve, referenceC: number): [number, number][] {
  const fit = fitted(curve, referenceC);
  if (!fit) return [];
  const low = curve.temperaturesC[0]!;
  const high = curve.temperaturesC.at(-1)!;
  return Array.from({ length: 41 }, (_, i): [number, number] => {
    const t = low + ((high - low) * i) / 40;
    return [t, cubicOffsetPpm(fit, t)];
  });
}
