import { type ShareWriter, sharesBeyond } from './beyond-shares';
import { requireFinite, requireNonNegative } from './errors';
import { type FarEnd, type LinkDoppler } from './far-end';
import { type ShareBoundMethod, chernoffUpper, shareUpperBound } from './share-bound';

export interface LinkQuestion {
  /** Offsets of the measured units, ppm, any order. */
  readonly unitsPpm: ArrayLike<number>;
  readonly farEnd: FarEnd;
  readonly doppler?: LinkDoppler;
  /** Drift of our unit in service (temperature, ageing ...), worst case, ppm. */
  readonly serviceDriftPpm?: number;
  /** Ends of the regions in ppm of the carrier; see regimeBoundsPpm. */
  readonly symbolRateRegionPpm: number;
  readonly frontEndWholePpm: number;
  /** True when every unit of the lot was measured: then nothing is left to infer about units. */
  readonly wholeLot?: boolean;
  /** One-sided confidence of the bounds; 0.95 when absent. */
  readonly confidence?: number;
}

export interface RegionShare {
  /** Mean over the units of the probability that a link with that unit lies there. */
  share: number;
  /** One-sided upper bound of that share for units like these. */
  upperBound: number;
  method: ShareBoundMethod;
}

export interface LinkShares {
  units: number;
  /** One sample per symbol workable. Its bound is from below: one minus the upper bound of leaving it. */
  symbolRate: { share: number; lowerBound: number };
  /** Several samples per symbol needed before the matched filter. */
  oversampled: RegionShare;
  outsideFrontEnd: RegionShare;
  /** The last two together. */
  beyondSymbolRate: RegionShare;
}

interface Sums {
  sum: number;
  squares: number;
}

function boundOf(
  sums: Sums,
  units: number,
  farEnds: number | null,
  question: LinkQuestion,
): RegionShare {
  const share = Math.min(1, sums.sum / units);
  const confidence = question.confidence ?? 0.95;
  if (farEnds !== null) {
    // Both ends are samples: an average over pairs behaves at worst like one over min(n, m) pairs.
    const count = question.wholeLot ? farEnds : Math.min(units, farEnds);
    const upperBound = chernoffUpper(share, count, 1 - confidence);
    return { share, upperBound, method: 'chernoff-hoeffding' };
  }
  if (question.wholeLot) return { share, upperBound: share, method: 'whole-lot' };
  const spread = Math.max(0, sums.squares - units * share ** 2);
  const variance = units > 1 ? spread / (units - 1) : 0;
  const { upper, method } = shareUpperBound(share, variance, units, confidence);
  return { share, upperBound: upper, method };
}

/** Units whose shares are held at a time; two such stretches stay in the nearest cache. */
const STRETCH = 1024;

/** Sums over all units of the share beyond the first limit, between the two, and beyond the second. */
function sumShares(units: number, writeFirst: ShareWriter, writeSecond: ShareWriter) {
  const first = new Float64Array(STRETCH);
  const second = new Float64Array(STRETCH);
  const left: Sums = { sum: 0, squares: 0 };
  const between: Sums = { sum: 0, squares: 0 };
  const outside: Sums = { sum: 0, squares: 0 };
  for (let start = 0; start < units; start += STRETCH) {
    const end = Math.min(units, start + STRETCH);
    writeFirst(start, end, first);
    writeSecond(start, end, second);
    for (let i = 0; i < end - start; i += 1) {
      const p = first[i]!;
      const q = Math.min(p, second[i]!);
      const r = p - q;
      left.sum += p;
      left.squares += p * p;
      between.sum += r;
      between.squares += r * r;
      outside.sum += q;
      outside.squares += q * q;
    }
  }
  return { left, between, outside };
}

/**
 * Share of links, each made of a unit of this lot and a far end, in each region of offset.
 *
 * For unit u the link's offset is u - b (+ Doppler), b the far end. Its probability of lying beyond a
 * limit is exact: from the far end's distribution, or by counting every pair. The lot's share is the
 * mean over its units. Doppler of the worst case and drift in service shorten the limits.
 *
 * The bound is one-sided and sound whatever the lot's distribution: the units are taken as drawn
 * independently from the lot's supply (or without replacement from the lot, where the first of the
 * two bounds holds too), the far end's distribution as known. See {@link shareUpperBound}; with a
 * measured far end the Chernoff-Hoeffding bound for averages over pairs is used. The uncertainty of
 * the readings is not in it.
 *
 * Cost: order n for uniform and normal far ends, n + m for a measured one, after sorting both.
 *
 * @throws RadioError `too_few`, `not_finite`, `out_of_range`
 * @see W. Hoeffding (1963); A. Maurer and M. Pontil (2009)
 */
export function linkShares(question: LinkQuestion): LinkShares {
  const doppler = question.doppler ?? { model: 'worst-case', halfWidthPpm: 0 };
  const dopplerPpm = requireNonNegative(doppler.halfWidthPpm, 'doppler.halfWidthPpm');
  const worstCasePpm =
    requireNonNegative(question.serviceDriftPpm ?? 0, 'serviceDriftPpm') +
    (doppler.model === 'worst-case' ? dopplerPpm : 0);
  const frontEnd = requireFinite(question.frontEndWholePpm, 'frontEndWholePpm');
  const symbolRate = Math.min(
    requireFinite(question.symbolRateRegionPpm, 'symbolRateRegionPpm'),
    frontEnd,
  );

  const beyond = sharesBeyond(
    question.unitsPpm,
    question.farEnd,
    doppler.model === 'uniform' ? dopplerPpm : 0,
  );
  const { left, between, outside } = sumShares(
    beyond.units,
    beyond.writer(symbolRate - worstCasePpm),
    beyond.writer(frontEnd - worstCasePpm),
  );
  const { units } = beyond;
  const farEnds = question.farEnd.model === 'measured' ? question.farEnd.offsetsPpm.length : null;
  const beyondSymbolRate = boundOf(left, units, farEnds, question);
  return {
    units,
    symbolRate: {
      share: 1 - beyondSymbolRate.share,
      lowerBound: 1 - beyondSymbolRate.upperBound,
    },
    oversampled: boundOf(between, units, farEnds, question),
    outsideFrontEnd: boundOf(outside, units, farEnds, question),
    beyondSymbolRate,
  };
}
