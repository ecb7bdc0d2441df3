import { requireOpenShare, requireWhole } from '../statistics/checks';
import { binomialCdf } from '../statistics/distributions/binomial';
import {
  noncentralTQuantile,
  noncentralTUpperTail,
} from '../statistics/distributions/noncentral-t';
import { normalUpperQuantile } from '../statistics/distributions/normal';
import { attributePlanForLetter, type AttributeTablePlan } from './attribute-plan';
import { type CodeLetter, type Severity } from './rule';
import {
  STANDARD_414_K,
  STANDARD_414_SAMPLE_SIZES,
  VARIABLES_SAMPLE_SIZES,
} from './tables/variables-standard';

export interface VariablesTablePlan {
  codeLetter: CodeLetter;
  sampleSize: number;
  /** Acceptability constant: the limit must lie at least k standard deviations from the mean. */
  k: number;
  /** The attribute plan whose risk at the AQL this one meets. */
  matched: AttributeTablePlan & { acceptanceProbabilityAtAql: number };
  /** What MIL-STD-414 prescribes for this sample size and AQL, where known, and k minus that. */
  standard: { letter: string; k: number; difference: number } | null;
}

/**
 * Acceptability constant of a one-limit s-method plan that accepts a lot of the given share with the given probability:
 * k = t'(1 - P; n - 1, sqrt(n) z_share) / sqrt(n), t' the noncentral t quantile.
 * @param sampleSize n, 2 or more
 * @param share share nonconforming, strictly between 0 and 1
 * @param acceptance probability of acceptance P at that share, strictly between 0 and 1
 * @throws StatisticsError when an argument is outside its range
 * Source: Johnson and Welch, Biometrika 31, 1940 (noncentral t in acceptance by variables).
 */
export function acceptabilityConstant(
  sampleSize: number,
  share: number,
  acceptance: number,
): number {
  requireWhole(sampleSize, 'sampleSize', 2);
  requireOpenShare(share, 'share');
  requireOpenShare(acceptance, 'acceptance');
  const root = Math.sqrt(sampleSize);
  const delta = root * normalUpperQuantile(share);
  return noncentralTQuantile(1 - acceptance, sampleSize - 1, delta) / root;
}

/**
 * Probability that a lot of the given share passes: P(T >= k sqrt(n)), T noncentral t with n - 1 degrees and
 * noncentrality sqrt(n) z_share. Exact for a normal lot and one limit.
 * @throws StatisticsError when an argument is outside its range
 */
export function variablesAcceptance(sampleSize: number, k: number, share: number): number {
  requireWhole(sampleSize, 'sampleSize', 2);
  if (share <= 0) return 1;
  if (share >= 1) return 0;
  const root = Math.sqrt(sampleSize);
  return noncentralTUpperTail(k * root, sampleSize - 1, root * normalUpperQuantile(share));
}

/**
 * The variables plan (s method) of a code letter and AQL. k is recomputed, not read from a table: it makes the
 * probability of acceptance at the AQL equal to that of the attribute plan of the same letter and severity.
 * Reduced inspection takes the sample two letters up, as the attribute tables do.
 * @throws as attributePlanForLetter
 */
export function variablesPlanForLetter(
  letter: CodeLetter,
  aqlPercent: number,
  severity: Severity,
): VariablesTablePlan {
  const attribute = attributePlanForLetter(letter, aqlPercent, severity);
  const share = aqlPercent / 100;
  const acceptanceProbabilityAtAql = binomialCdf(
    attribute.rejectionNumber - 1,
    attribute.sampleSize,
    share,
  );
  const sampleSize = VARIABLES_SAMPLE_SIZES[sizeLetter(attribute.codeLetter, severity)];
  const k = acceptabilityConstant(sampleSize, share, acceptanceProbabilityAtAql);
  const standard = severity === 'normal' ? standardK(sampleSize, aqlPercent) : null;
  return {
    codeLetter: attribute.codeLetter,
    sampleSize,
    k,
    matched: { ...attribute, acceptanceProbabilityAtAql },
    standard: standard && { ...standard, difference: k - standard.k },
  };
}

/** The k of MIL-STD-414 for a sample size and AQL (percent), normal inspection; null where the table is not known here. */
export function standardK(
  sampleSize: number,
  aqlPercent: number,
): { letter: string; k: number } | null {
  const entry = Object.entries(STANDARD_414_SAMPLE_SIZES).find(([, size]) => size === sampleSize);
  const k = entry && STANDARD_414_K[String(aqlPercent)]?.[entry[0]];
  return k === undefined ? null : { letter: entry![0], k };
}

function sizeLetter(letter: CodeLetter, severity: Severity): CodeLetter {
  if (severity !== 'reduced') return letter;
  const letters = Object.keys(VARIABLES_SAMPLE_SIZES) as CodeLetter[];
  return letters[Math.max(0, letters.indexOf(letter) - 2)]!;
}
