import { type PartCriteria } from '../contract/parts';
import { type ReceiverCriteria } from '../contract/receivers';
import { type PartDrift, type Receiver } from '../radio/allowance';

/**
 * Ageing over a service life, ppm. Between the stated first and tenth year a logarithmic course is taken:
 * first + (ten - first) log10(years); with one figure only, that figure grows with the years, which errs on the safe side.
 * Common practice.
 */
export function serviceAgeingPpm(
  part: Pick<PartCriteria, 'ageingFirstYearPpm' | 'ageingTenYearsPpm'>,
  years: number,
): number {
  const { ageingFirstYearPpm: first, ageingTenYearsPpm: ten } = part;
  if (first !== null && ten !== null) {
    if (years <= 1) return first * years;
    return Math.max(first, first + (ten - first) * Math.log10(years));
  }
  if (first !== null) return first * years;
  if (ten !== null) return ten * Math.max(1, years / 10);
  return 0;
}

/** What a unit of the part adds, in service, to its offset as measured. */
export function partDrift(part: PartCriteria, serviceLifeYears: number): PartDrift {
  return {
    temperaturePpm: part.stabilityPpm ?? 0,
    ageingPpm: serviceAgeingPpm(part, serviceLifeYears),
    supplyPpm: part.supplyPpm,
    loadPpm: part.loadPpm,
  };
}

/** The contract's receiver as the computation takes it. */
export function radioReceiver(criteria: ReceiverCriteria): Receiver {
  return {
    carrierHz: Number(criteria.carrierHz),
    symbolRateHz: Number(criteria.symbolRateHz),
    frontEndBandwidthHz: Number(criteria.frontEndBandwidthHz),
    pulse:
      criteria.pulse === 'rectangular'
        ? { shape: 'rectangular' }
        : { shape: 'root-raised-cosine', rollOff: criteria.rollOff ?? 0 },
    shareOfSymbolRate: criteria.shareOfSymbolRate,
    farEndTolerancePpm: criteria.farEndTolerancePpm,
    greatestSpeedMps: criteria.greatestSpeedMps,
    serviceLifeYears: criteria.serviceLifeYears,
    allowedShareBeyond: criteria.allowedShareBeyond,
  };
}
