import { type Contribution } from './budget';
import { dopplerPpm } from './doppler';
import { requireNonNegative, requirePositive, requireWithin } from './errors';
import { type ReceiverBands, regimeBounds } from './regimes';

/** What the product keeps of a receiver. */
export interface Receiver extends ReceiverBands {
  /** Half-width of the far end's offset, ppm of the carrier. */
  readonly farEndTolerancePpm: number;
  /** Greatest speed between the ends, m/s. */
  readonly greatestSpeedMps: number;
  /** Years over which the link has to work. */
  readonly serviceLifeYears: number;
  /** Share of links that may lie beyond the allowed region, 0 to 1. */
  readonly allowedShareBeyond: number;
}

/** What a unit of the part may add to its offset as measured, half-widths in ppm. */
export interface PartDrift {
  readonly temperaturePpm?: number;
  /** Drift per year, multiplied by the service life: an upper figure for ageing that slows down. */
  readonly ageingPpmPerYear?: number;
  /** Ageing over the whole service life where it is known; takes the place of the yearly figure. */
  readonly ageingPpm?: number;
  readonly supplyPpm?: number;
  readonly loadPpm?: number;
}

/** The region in which the receiver has to stay: set by its demodulator. */
export type AllowedRegion = 'symbol-rate' | 'front-end';

export interface Allowance {
  region: AllowedRegion;
  /** End of the region: the greatest |offset| between the ends; zero when the front end is too narrow for the signal. */
  totalHz: number;
  totalPpm: number;
  /** What is used up before our unit's own offset, worst case, in the order of a budget. */
  usedUp: Contribution[];
  usedUpPpm: number;
  /** What is left for our unit's offset as measured; below zero when nothing is left. */
  remainsPpm: number;
  remainsHz: number;
  /** What would be left to each end if both had the same tolerance: half of the total less Doppler. */
  equalEndsPpm: number;
}

/** What our unit adds to its measured offset in service, worst case, ppm by cause. */
export function serviceDrift(part: PartDrift, serviceLifeYears: number): Contribution[] {
  const ageingPpm =
    part.ageingPpm ??
    requireNonNegative(part.ageingPpmPerYear ?? 0, 'ageingPpmPerYear') * serviceLifeYears;
  const drifts: Contribution[] = [
    { kind: 'temperature', halfWidthPpm: part.temperaturePpm ?? 0 },
    { kind: 'ageing', halfWidthPpm: ageingPpm },
    { kind: 'supply', halfWidthPpm: part.supplyPpm ?? 0 },
    { kind: 'load', halfWidthPpm: part.loadPpm ?? 0 },
  ];
  for (const { kind, halfWidthPpm } of drifts)
    requireNonNegative(halfWidthPpm, `${kind} halfWidthPpm`);
  return drifts;
}

/**
 * A receiver's allowance for the offset between the ends, and what of it remains for our unit.
 *
 * Total = end of the allowed region (min(F1, F2), or F2 for a receiver that corrects the frequency on
 * several samples per symbol), as Hz and as ppm of the carrier. Temperature, ageing, supply, load, the
 * far end's tolerance and Doppler are taken off in full: the worst case.
 *
 * @throws RadioError `not_positive`, `not_finite`, `out_of_range`
 */
export function receiverAllowance(
  receiver: Receiver,
  part: PartDrift = {},
  region: AllowedRegion = 'symbol-rate',
): Allowance {
  requireWithin(receiver.allowedShareBeyond, 0, 1, 'allowedShareBeyond');
  const lifeYears = requireNonNegative(receiver.serviceLifeYears, 'serviceLifeYears');
  const carrierHz = requirePositive(receiver.carrierHz, 'carrierHz');
  const bounds = regimeBounds(receiver);
  const boundHz = region === 'symbol-rate' ? bounds.symbolRateRegionHz : bounds.frontEndWholeHz;
  const totalHz = Math.max(0, boundHz);
  const totalPpm = (totalHz / carrierHz) * 1e6;
  const doppler = dopplerPpm(receiver.greatestSpeedMps);
  const usedUp: Contribution[] = [
    ...serviceDrift(part, lifeYears),
    {
      kind: 'far-end',
      halfWidthPpm: requireNonNegative(receiver.farEndTolerancePpm, 'farEndTolerancePpm'),
    },
    { kind: 'doppler', halfWidthPpm: doppler },
  ];
  const usedUpPpm = usedUp.reduce((sum, { halfWidthPpm }) => sum + halfWidthPpm, 0);
  const remainsPpm = totalPpm - usedUpPpm;
  return {
    region,
    totalHz,
    totalPpm,
    usedUp,
    usedUpPpm,
    remainsPpm,
    remainsHz: (remainsPpm * carrierHz) / 1e6,
    equalEndsPpm: Math.max(0, totalPpm - doppler) / 2,
  };
}
