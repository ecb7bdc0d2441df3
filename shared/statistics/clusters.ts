import { requireCount } from './checks';
import { binomialCdf } from './distributions/binomial';
import { fitTwoNormals, type NormalMixture } from './normal-mixture';
import { countBelow, countUpTo } from './sorted';

/** What speaks for two clusters in one lot (mixed blanks), and whether all of it does. */
export interface ClusterWarning {
  /** True when every criterion is met. */
  mixed: boolean;
  /** The two fitted groups, the lower first; null when no two groups could be fitted. */
  groups: [ClusterGroup, ClusterGroup] | null;
  /** Ashman's D = sqrt 2 |mean_1 - mean_2| / sqrt(sd_1^2 + sd_2^2); above 2 means a clean separation. */
  separation: number;
  /** BIC of one normal less BIC of two; above 10 is very strong evidence for two. */
  evidence: number;
  /** Chance of so empty a valley between the groups if the values had a single hump. */
  valleyP: number;
  /** Where the valley lies, in the unit of the values. */
  valley: number | null;
}

export interface ClusterGroup {
  mean: number;
  sd: number;
  share: number;
}

/** Least D, BIC difference and share of the smaller group, largest valley p, for a warning. */
export const CLUSTER_CRITERIA = { separation: 2, evidence: 10, valleyP: 0.01, share: 0.02 };

const NO_CLUSTERS: ClusterWarning = {
  mixed: false,
  groups: null,
  separation: 0,
  evidence: 0,
  valleyP: 1,
  valley: null,
};

/**
 * Looks for two clusters in one lot.
 * Two normals are fitted by expectation-maximisation (large lots through 512 equal groups of neighbours). The warning needs
 * all of: Ashman's D above 2; BIC better by more than 10; the smaller group at least 2 % and 5 units; and a valley that is
 * really empty: of equally wide windows at the valley and at the lower hump a single-humped population puts at least half
 * into the valley, so the count there is judged by the exact binomial test at 1 %. The last keeps flat and heavy-tailed lots,
 * which two normals also fit better than one, from raising the alarm.
 * @param sorted ten or more values in ascending order
 * @throws StatisticsError when fewer than ten values
 * Source: K. Ashman, C. Bird and S. Zepf, Astronomical Journal 108, 1994 (D); R. Kass and A. Raftery, JASA 90, 1995 (BIC
 * scale); the valley test is the sign test applied to the definition of one hump.
 */
export function twoClusters(sorted: Float64Array): ClusterWarning {
  requireCount(sorted.length, 'sorted', 10);
  const n = sorted.length;
  const resolution = smallestStep(sorted);
  if (resolution === null) return NO_CLUSTERS;
  const mixture = fitTwoNormals(sorted, resolution / Math.sqrt(12));
  if (mixture === null) return NO_CLUSTERS;
  const [first, second] = mixture.groups;
  const separation = (Math.SQRT2 * (second.mean - first.mean)) / Math.hypot(first.sd, second.sd);
  const evidence =
    2 * (mixture.logLikelihood - mixture.oneNormalLogLikelihood) - (5 - 2) * Math.log(n);
  const valley = valleyBetween(mixture);
  const valleyP = valley === null ? 1 : valleyChance(sorted, mixture, valley);
  const smaller = Math.min(first.share, second.share);
  const mixed =
    separation > CLUSTER_CRITERIA.separation &&
    evidence > CLUSTER_CRITERIA.evidence &&
    valleyP < CLUSTER_CRITERIA.valleyP &&
    smaller >= CLUSTER_CRITERIA.share &&
    smaller * n >= 5 &&
    // Two neighbouring steps of a coarse counter are not two clusters.
    second.mean - first.mean >= 4 * resolution;
  return { mixed, groups: mixture.groups, separation, evidence, valleyP, valley };
}

/** Lowest point of the fitted density between the two means; null when the density has one hump only. */
function valleyBetween({ groups: [a, b] }: NormalMixture): number | null {
  const density = (x: number) => part(a, x) + part(b, x);
  const steps = 200;
  let lowest = a.mean;
  let value = Infinity;
  for (let i = 0; i <= steps; i += 1) {
    const x = a.mean + ((b.mean - a.mean) * i) / steps;
    const here = density(x);
    if (here < value) {
      value = here;
      lowest = x;
    }
  }
  return lowest > a.mean && lowest < b.mean ? lowest : null;
}

function valleyChance(sorted: Float64Array, mixture: NormalMixture, valley: number): number {
  const [a, b] = mixture.groups;
  const reach = Math.min(valley - a.mean, b.mean - valley) / 2;
  const within = (x: number) => countBelow(sorted, x + reach) - countUpTo(sorted, x - reach);
  const inValley = within(valley);
  const onHump = Math.min(within(a.mean), within(b.mean));
  return inValley + onHump === 0 ? 1 : binomialCdf(inValley, inValley + onHump, 0.5);
}

function part(group: ClusterGroup, x: number): number {
  const z = (x - group.mean) / group.sd;
  return (group.share / group.sd) * Math.exp(-0.5 * z * z);
}

/** Smallest difference of neighbouring values that differ (the counter's resolution); null when all agree. */
function smallestStep(sorted: Float64Array): number | null {
  let smallest = Infinity;
  for (let i = 1; i < sorted.length; i += 1) {
    const step = sorted[i]! - sorted[i - 1]!;
    if (step > 0 && step < smallest) smallest = step;
  }
  return smallest === Infinity ? null : smallest;
}
