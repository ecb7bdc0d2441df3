import { RadioError, requireNonNegative } from './errors';
import { rectangularSumBeyond } from './rectangular-sum';

/** Causes of an offset, in the order in which a budget is drawn. */
export const CONTRIBUTION_KINDS = [
  'initial-tolerance',
  'temperature',
  'ageing',
  'supply',
  'load',
  'far-end',
  'doppler',
] as const;

export type ContributionKind = (typeof CONTRIBUTION_KINDS)[number];

/** One cause and the half-width of its range, ppm: the offset lies in +/-halfWidthPpm. */
export interface Contribution {
  readonly kind: ContributionKind;
  readonly halfWidthPpm: number;
}

export interface FrequencyBudget {
  contributions: Contribution[];
  allowancePpm: number;
  /** Sum of the half-widths. */
  worstCasePpm: number;
  /** Square root of the sum of squared half-widths: a convention, not a probability (common practice). */
  rootSumSquarePpm: number;
  /** Standard uncertainty of the sum, each contribution rectangular: sqrt(sum w^2 / 3). */
  standardUncertaintyPpm: number;
  /** Twice that. */
  expandedUncertaintyPpm: number;
  /** Exact probability that the sum leaves the allowance, each contribution independent and rectangular. */
  shareBeyondAllowance: number;
  /** Allowance minus each of the sums; below zero when the budget does not fit. */
  marginPpm: { worstCase: number; rootSumSquare: number; expandedUncertainty: number };
}

/**
 * Budget of carrier frequency offset: contributions +/-w_i against an allowance, combined by worst
 * case, root-sum-square of limits, standard uncertainty, and exact convolution of rectangulars.
 *
 * The convolution supposes that every value inside each range is equally likely and that causes are
 * independent. Doppler and the far end's tolerance are not chosen by the maker of this end.
 *
 * @param contributions half-widths in ppm, zero or above, at most 12 above zero
 * @param allowancePpm what the receiver tolerates, ppm, zero or above
 * @throws RadioError `out_of_range`, `not_finite`, `too_many`, `too_few`
 * @see JCGM 100:2008 4.3.7, 5.1.2, 6.2 (from memory); JCGM 101:2008
 */
export function frequencyBudget(
  contributions: readonly Contribution[],
  allowancePpm: number,
): FrequencyBudget {
  requireNonNegative(allowancePpm, 'allowancePpm');
  if (contributions.length === 0) {
    throw new RadioError('too_few', 'contributions', 'must hold at least one contribution');
  }
  const widths = contributions.map((c) =>
    requireNonNegative(c.halfWidthPpm, `${c.kind} halfWidthPpm`),
  );
  const worstCasePpm = widths.reduce((sum, w) => sum + w, 0);
  const rootSumSquarePpm = Math.hypot(...widths);
  const standardUncertaintyPpm = rootSumSquarePpm / Math.sqrt(3);
  const expandedUncertaintyPpm = 2 * standardUncertaintyPpm;
  return {
    contributions: [...contributions],
    allowancePpm,
    worstCasePpm,
    rootSumSquarePpm,
    standardUncertaintyPpm,
    expandedUncertaintyPpm,
    shareBeyondAllowance: rectangularSumBeyond(widths, allowancePpm),
    marginPpm: {
      worstCase: allowancePpm - worstCasePpm,
      rootSumSquare: allowancePpm - rootSumSquarePpm,
      expandedUncertainty: allowancePpm - expandedUncertaintyPpm,
    },
  };
}
