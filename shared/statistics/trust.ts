import { countOf } from '../format/counts';
import { requireWhole } from './checks';
import type { ClusterWarning } from './clusters';
import type { NormalityTest } from './normality';
import type { EsdTest } from './outliers';

/** Which figures of the share beyond limits to rely on. */
export type TrustedMethod = 'observed' | 'normal';

export type TrustReason =
  | 'too_few_to_check'
  | 'no_spread'
  | 'two_clusters'
  | 'outliers'
  | 'not_normal'
  | 'count_decides'
  | 'looks_normal';

export interface Trust {
  method: TrustedMethod;
  reasons: TrustReason[];
  /** One plain sentence a person can act on. */
  sentence: string;
}

export interface TrustEvidence {
  n: number;
  /** Units found beyond the limits. */
  found: number;
  normality: NormalityTest | null;
  outliers: EsdTest | null;
  clusters: ClusterWarning | null;
}

/** Fewest values by which normality can be told apart at all (common practice). */
const FEWEST_FOR_NORMAL = 20;
/** From here on the count is precise by itself: a sampled tail is worth more than a fitted one (common practice). */
const COUNT_DECIDES = 10_000;
const SIGNIFICANCE = 0.05;

/**
 * Which estimate of the share beyond limits to trust: the normal one (unbiased estimate and noncentral t bound) only when
 * nothing speaks against a normal lot and there are enough units to have noticed; the count with its exact bound otherwise.
 * @throws StatisticsError when n or found is not a whole number, or n is zero
 * Source: common practice; the significance level is 5 %.
 */
export function trustworthyMethod(evidence: TrustEvidence): Trust {
  const { n, found, normality, outliers, clusters } = evidence;
  requireWhole(n, 'n', 1);
  requireWhole(found, 'found');
  const reasons: TrustReason[] = [];
  if (clusters?.mixed) reasons.push('two_clusters');
  if (outliers !== null && outliers.outliers.length > 0) reasons.push('outliers');
  if (normality !== null && normality.p < SIGNIFICANCE) reasons.push('not_normal');
  if (reasons.length === 0) {
    if (n < FEWEST_FOR_NORMAL) reasons.push('too_few_to_check');
    else if (normality === null) reasons.push('no_spread');
    else if (n >= COUNT_DECIDES && found > 0) reasons.push('count_decides');
  }
  if (reasons.length > 0) {
    return { method: 'observed', reasons, sentence: countSentence(reasons, evidence) };
  }
  return {
    method: 'normal',
    reasons: ['looks_normal'],
    sentence:
      `Nothing speaks against a normal lot in ${countOf(n, 'unit')}: rely on the normal-theory estimate and its bound, ` +
      'which see further into the tail than the count.',
  };
}

function countSentence(reasons: TrustReason[], { n, outliers }: TrustEvidence): string {
  const rely = 'rely on the count and its exact bound';
  switch (reasons[0]) {
    case 'two_clusters':
      return `The lot shows two clusters, perhaps mixed blanks: ${rely}, and sort or split the lot before judging it as one.`;
    case 'outliers': {
      const many = outliers!.outliers.length;
      const units = many === 1 ? 'One unit lies' : `${many} units lie`;
      return `${units} too far out for a normal lot: ${rely}; the normal-theory figures do not hold here.`;
    }
    case 'not_normal':
      return `The ${countOf(n, 'unit')} do not follow a normal distribution: ${rely}; the normal-theory figures do not hold here.`;
    case 'too_few_to_check':
      return `With ${countOf(n, 'unit')} a normal lot cannot be told from another: ${rely}, and measure more units for a closer one.`;
    case 'no_spread':
      return `The readings show no spread to build on: ${rely}, and check the resolution of the counter.`;
    default:
      return `With ${countOf(n, 'unit')} the count is precise by itself: ${rely}.`;
  }
}
