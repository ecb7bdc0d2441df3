import { requireCount, requireFinite, requirePositive } from '../statistics/checks';
import { requireNotNegative } from './checks';

/** How the time-base error is stated: half-width of a rectangle, a standard uncertainty, or an expanded one. */
export type TimeBase =
  | { form: 'rectangular'; ppb: number }
  | { form: 'standard'; ppb: number }
  | { form: 'expanded'; ppb: number; coverageFactor: number };

export interface CounterReading {
  nominalHz: number;
  /** Two or more readings of one unit. */
  readingsHz: readonly number[];
  gateS: number;
  /** A direct counter resolves one count over the gate; a reciprocal one its time resolution over the gate. */
  counter: { kind: 'direct' } | { kind: 'reciprocal'; timeResolutionHalfWidthS: number };
  timeBase: TimeBase;
}

export interface CounterUncertainty {
  meanHz: number;
  offsetPpb: number;
  /** Standard uncertainty of the mean from the spread of the readings. */
  typeAPpb: number;
  /** Full width of one count (direct) or half-width (reciprocal), as a fraction. */
  resolutionPpb: number;
  resolutionStandardPpb: number;
  /** The same for every unit of a session: see lotMeanUncertainty. */
  timeBaseStandardPpb: number;
  combinedPpb: number;
  expandedK2Ppb: number;
  expandedK2Hz: number;
  /** Welch-Satterthwaite with the type B terms taken as exact; infinite when the readings agree. */
  effectiveDegrees: number;
}

const PPB = 1e9;

/**
 * Uncertainty budget of a frequency measured with a counter.
 * Type A s/sqrt(n); resolution one count/sqrt(12) or half-width/sqrt(3); time base; combined by root-sum-square.
 * @throws StatisticsError with fewer than two readings or an argument out of range
 * Source: JCGM 100:2008, 4.2, 4.3.7, 5.1.2, 6.2, G.4 (from memory).
 */
export function counterUncertainty({
  nominalHz,
  readingsHz,
  gateS,
  counter,
  timeBase,
}: CounterReading): CounterUncertainty {
  requirePositive(nominalHz, 'nominalHz');
  requirePositive(gateS, 'gateS');
  requireCount(readingsHz.length, 'readingsHz', 2);
  const count = readingsHz.length;
  // Deviations from nominal first: sums of 10 MHz would swallow the millihertz.
  const deviations = readingsHz.map((hz) => {
    requireFinite(hz, 'readingsHz');
    return hz - nominalHz;
  });
  const meanDeviation = deviations.reduce((sum, each) => sum + each, 0) / count;
  const squares = deviations.reduce((sum, each) => sum + (each - meanDeviation) ** 2, 0);
  const typeAHz = Math.sqrt(squares / (count - 1) / count);
  const typeAPpb = (typeAHz / nominalHz) * PPB;
  const { resolutionPpb, resolutionStandardPpb } = resolution(nominalHz, gateS, counter);
  const timeBaseStandardPpb = timeBaseStandard(timeBase);
  const combinedPpb = Math.hypot(typeAPpb, resolutionStandardPpb, timeBaseStandardPpb);
  return {
    meanHz: nominalHz + meanDeviation,
    offsetPpb: (meanDeviation / nominalHz) * PPB,
    typeAPpb,
    resolutionPpb,
    resolutionStandardPpb,
    timeBaseStandardPpb,
    combinedPpb,
    expandedK2Ppb: 2 * combinedPpb,
    expandedK2Hz: (2 * combinedPpb * nominalHz) / PPB,
    effectiveDegrees: typeAPpb === 0 ? Infinity : (combinedPpb / typeAPpb) ** 4 * (count - 1),
  };
}

function resolution(nominalHz: number, gateS: number, counter: CounterReading['counter']) {
  if (counter.kind === 'direct') {
    const resolutionPpb = PPB / (gateS * nominalHz);
    return { resolutionPpb, resolutionStandardPpb: resolutionPpb / Math.sqrt(12) };
  }
  requireNotNegative(counter.timeResolutionHalfWidthS, 'timeResolutionHalfWidthS');
  const resolutionPpb = (counter.timeResolutionHalfWidthS / gateS) * PPB;
  return { resolutionPpb, resolutionStandardPpb: resolutionPpb / Math.sqrt(3) };
}

function timeBaseStandard(timeBase: TimeBase): number {
  requireNotNegative(timeBase.ppb, 'timeBase.ppb');
  if (timeBase.form === 'standard') return timeBase.ppb;
  if (timeBase.form === 'rectangular') return timeBase.ppb / Math.sqrt(3);
  requirePositive(timeBase.coverageFactor, 'timeBase.coverageFactor');
  return timeBase.ppb / timeBase.coverageFactor;
}

export interface TimeBaseHistory {
  ageingLimitPpbPerDay: number;
  daysSinceCalibration: number;
  calibrationExpandedPpb: number;
  /** k of the certificate. Default 2. */
  calibrationCoverageFactor?: number;
  temperatureHalfWidthPpb: number;
}

export interface TimeBaseUncertainty {
  ageingPpb: number;
  calibrationPpb: number;
  temperaturePpb: number;
  standardPpb: number;
  expandedK2Ppb: number;
}

/**
 * Standard uncertainty of a time base some days after its calibration: ageing limit x days/sqrt(3),
 * certificate U/k, temperature half-width/sqrt(3), combined by root-sum-square.
 * @throws StatisticsError when an argument is below zero
 * Source: JCGM 100:2008, 4.3.7, 5.1.2 (from memory).
 */
export function timeBaseUncertainty(history: TimeBaseHistory): TimeBaseUncertainty {
  const {
    ageingLimitPpbPerDay,
    daysSinceCalibration,
    calibrationExpandedPpb,
    temperatureHalfWidthPpb,
  } = history;
  const factor = history.calibrationCoverageFactor ?? 2;
  requireNotNegative(ageingLimitPpbPerDay, 'ageingLimitPpbPerDay');
  requireNotNegative(daysSinceCalibration, 'daysSinceCalibration');
  requireNotNegative(calibrationExpandedPpb, 'calibrationExpandedPpb');
  requireNotNegative(temperatureHalfWidthPpb, 'temperatureHalfWidthPpb');
  requirePositive(factor, 'calibrationCoverageFactor');
  const ageingPpb = (ageingLimitPpbPerDay * daysSinceCalibration) / Math.sqrt(3);
  const calibrationPpb = calibrationExpandedPpb / factor;
  const temperaturePpb = temperatureHalfWidthPpb / Math.sqrt(3);
  const standardPpb = Math.hypot(ageingPpb, calibrationPpb, temperaturePpb);
  return { ageingPpb, calibrationPpb, temperaturePpb, standardPpb, expandedK2Ppb: 2 * standardPpb };
}
