import { type SharesBeyond, sharesBeyond } from './beyond-shares';
import { requireNonNegative } from './errors';
import { type FarEnd, type LinkDoppler } from './far-end';
import { sortedOffsets } from './lot-pairs';
import { matchedFilterLoss } from './matched-filter';
import { type ReceiverBands } from './regimes';

export interface LinkLossQuestion {
  /** Offsets of the measured units, ppm, any order. */
  readonly unitsPpm: ArrayLike<number>;
  readonly farEnd: FarEnd;
  readonly doppler?: LinkDoppler;
  /** Drift of our unit in service, worst case, ppm. */
  readonly serviceDriftPpm?: number;
  readonly receiver: ReceiverBands;
}

/** The offset that a share of links does not exceed, and what it costs there. */
export interface LossAtShare {
  offsetPpm: number;
  offsetHz: number;
  /** Correlation-peak loss, dB, zero or below; null when nothing is left. */
  correlationPeakDb: number | null;
}

export interface LinkLoss {
  /** Mean over links of the correlation-peak power, in dB; null when nothing is left. */
  meanCorrelationPeakDb: number | null;
  /** Mean over links of the output energy, in dB; null when nothing is left. */
  meanOutputEnergyDb: number | null;
  halfOfLinks: LossAtShare;
  nineteenOfTwenty: LossAtShare;
}

/** A larger lot is represented by this many of its evenly spaced order statistics. */
const REPRESENTATIVES = 4000;
const STEPS = 256;
/** Links beyond are left to the last step. */
const NEGLIGIBLE_SHARE = 1e-6;

function representatives(unitsPpm: ArrayLike<number>): Float64Array {
  const sorted = sortedOffsets(unitsPpm, 'unitsPpm');
  if (sorted.length <= REPRESENTATIVES) return sorted;
  return Float64Array.from(
    { length: REPRESENTATIVES },
    (_, i) => sorted[Math.floor(((i + 0.5) * sorted.length) / REPRESENTATIVES)]!,
  );
}

function meanShare({ units, writer }: SharesBeyond, limitPpm: number): number {
  const shares = new Float64Array(units);
  writer(limitPpm)(0, units, shares);
  return shares.reduce((sum, share) => sum + share, 0) / units;
}

/** Least offset that no more than `share` of links exceed, by bisection. */
function offsetExceededBy(beyond: (offsetPpm: number) => number, share: number, start: number) {
  let high = start;
  while (beyond(high) > share) high *= 2;
  let low = 0;
  for (let step = 0; step < 40; step += 1) {
    const middle = (low + high) / 2;
    if (beyond(middle) > share) low = middle;
    else high = middle;
  }
  return high;
}

const toDb = (power: number) => (power > 0 ? 10 * Math.log10(power) : null);

/**
 * How much signal the matched filter loses over the links of a lot, without a correction of frequency.
 *
 * The share of links beyond each |offset| is exact for the units (or for 4000 evenly spaced order
 * statistics of a larger lot); the loss is averaged over 256 steps of offset. Doppler of the worst
 * case and drift in service are added to every link.
 *
 * @throws RadioError `too_few`, `not_finite`, `not_positive`, `out_of_range`
 */
export function linkLoss(question: LinkLossQuestion): LinkLoss {
  const { receiver } = question;
  const doppler = question.doppler ?? { model: 'worst-case', halfWidthPpm: 0 };
  const dopplerPpm = requireNonNegative(doppler.halfWidthPpm, 'doppler.halfWidthPpm');
  const addedPpm =
    requireNonNegative(question.serviceDriftPpm ?? 0, 'serviceDriftPpm') +
    (doppler.model === 'worst-case' ? dopplerPpm : 0);
  const shares = sharesBeyond(
    representatives(question.unitsPpm),
    question.farEnd,
    doppler.model === 'uniform' ? dopplerPpm : 0,
  );
  const beyond = (offsetPpm: number) => meanShare(shares, offsetPpm - addedPpm);
  const perPpm = receiver.carrierHz / 1e6 / receiver.symbolRateHz;
  const lossAt = (offsetPpm: number) => matchedFilterLoss(receiver.pulse, offsetPpm * perPpm);

  const start = 1 / perPpm;
  const farthest = offsetExceededBy(beyond, NEGLIGIBLE_SHARE, start);
  let wanted = 0;
  let energy = 0;
  let before = 1;
  for (let step = 0; step < STEPS; step += 1) {
    const from = (farthest * step) / STEPS;
    const to = (farthest * (step + 1)) / STEPS;
    const after = step === STEPS - 1 ? 0 : beyond(to);
    const loss = lossAt((from + to) / 2);
    wanted += (before - after) * loss.correlationPeakPower;
    energy += (before - after) * loss.outputEnergyFraction;
    before = after;
  }
  const atShare = (shareBeyond: number): LossAtShare => {
    const offsetPpm = offsetExceededBy(beyond, shareBeyond, start);
    return {
      offsetPpm,
      offsetHz: (offsetPpm * receiver.carrierHz) / 1e6,
      correlationPeakDb: lossAt(offsetPpm).correlationPeakDb,
    };
  };
  return {
    meanCorrelationPeakDb: toDb(wanted),
    meanOutputEnergyDb: toDb(energy),
    halfOfLinks: atShare(0.5),
    nineteenOfTwenty: atShare(0.05),
  };
}
