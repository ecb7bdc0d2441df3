import { requireFinite, requirePositive } from '../statistics/checks';
import { normalCdf, normalDensity, normalUpperTail } from '../statistics/distributions/normal';
import { integrate } from '../statistics/numeric/gauss-legendre';
import { requireLimits } from './checks';
import { type Limits } from './rule';
import { conformingProbability, type NormalKnowledge } from './specific-risk';

export interface GlobalRisk {
  conformingBefore: number;
  accepted: number;
  /** A unit is nonconforming and accepted: of all units, not of those accepted. */
  consumersRisk: number;
  /** A unit conforms and is refused: of all units. */
  producersRisk: number;
  /** Share conforming among the units accepted; null when none is accepted. */
  conformingOfAccepted: number | null;
}

/** Beyond so many standard deviations nothing is left that a double could show beside 1. */
const REACH = 9;

/**
 * Consumer's and producer's risk of a process and a rule, before measuring:
 * R_C = integral outside the limits, R_P = integral inside, of g(e) P(accept | e) and g(e) (1 - P(accept | e)),
 * with g the normal density of the process and P(accept | e) = Phi((A_U - e)/u) - Phi((A_L - e)/u).
 * By 20-point Gauss-Legendre panels cut at the limits and narrowed round the acceptance limits; absolute error below 1e-12.
 * @param process mean and standard deviation of the true values, sd above zero
 * @param standardUncertaintyPpm u of a reading, above zero
 * @param limits specification limits
 * @param acceptance acceptance limits; wider or narrower than the limits; when guard bands leave nothing between them,
 *   no unit is accepted
 * @throws StatisticsError when an argument is out of range
 * Source: JCGM 106:2012, clause 9.4 (from memory).
 */
export function globalRisk(
  process: NormalKnowledge,
  standardUncertaintyPpm: number,
  limits: Limits,
  acceptance: Limits,
): GlobalRisk {
  const { meanPpm, sdPpm } = process;
  const u = standardUncertaintyPpm;
  requireFinite(meanPpm, 'process.meanPpm');
  requirePositive(sdPpm, 'process.sdPpm');
  requirePositive(u, 'standardUncertaintyPpm');
  requireLimits(limits);
  const conformingBefore = conformingProbability(meanPpm, sdPpm, limits).conforming;
  if (leavesNothing(acceptance))
    return {
      conformingBefore,
      accepted: 0,
      consumersRisk: 0,
      producersRisk: conformingBefore,
      conformingOfAccepted: null,
    };
  requireLimits(acceptance);
  const density = (e: number) => normalDensity((e - meanPpm) / sdPpm) / sdPpm;
  const acceptedAt = (e: number) => conformingProbability(e, u, acceptance).conforming;
  const refusedAt = (e: number) => conformingProbability(e, u, acceptance).nonconforming;
  const edges = panelEdges(process, u, limits, acceptance);
  const inside = (e: number) =>
    e > (limits.lowPpm ?? -Infinity) && e < (limits.highPpm ?? Infinity);
  let consumersRisk = 0;
  let producersRisk = 0;
  for (let i = 0; i + 1 < edges.length; i += 1) {
    const [from, to] = [edges[i]!, edges[i + 1]!];
    if (inside((from + to) / 2))
      producersRisk += integrate((e) => density(e) * refusedAt(e), from, to, 1);
    else consumersRisk += integrate((e) => density(e) * acceptedAt(e), from, to, 1);
  }
  const spread = Math.hypot(sdPpm, u);
  const accepted = acceptedShare(meanPpm, spread, acceptance);
  return {
    conformingBefore,
    accepted,
    consumersRisk,
    producersRisk,
    conformingOfAccepted: accepted > 0 ? 1 - consumersRisk / accepted : null,
  };
}

const leavesNothing = ({ lowPpm, highPpm }: Limits) =>
  lowPpm !== null && highPpm !== null && lowPpm >= highPpm;

function acceptedShare(meanPpm: number, spread: number, { lowPpm, highPpm }: Limits): number {
  const above = highPpm === null ? 0 : normalUpperTail((highPpm - meanPpm) / spread);
  const below = lowPpm === null ? 0 : normalCdf((lowPpm - meanPpm) / spread);
  return 1 - above - below;
}

/** Half a standard deviation apart over the process, one u apart round each acceptance limit, and at the limits. */
function panelEdges(
  { meanPpm, sdPpm }: NormalKnowledge,
  u: number,
  limits: Limits,
  acceptance: Limits,
): number[] {
  const low = meanPpm - REACH * sdPpm;
  const high = meanPpm + REACH * sdPpm;
  const edges = [low, high];
  for (let step = -2 * REACH; step <= 2 * REACH; step += 1)
    edges.push(meanPpm + (step * sdPpm) / 2);
  for (const limit of [acceptance.lowPpm, acceptance.highPpm])
    if (limit !== null)
      for (let step = -REACH; step <= REACH; step += 1) edges.push(limit + step * u);
  for (const limit of [limits.lowPpm, limits.highPpm]) if (limit !== null) edges.push(limit);
  return [...new Set(edges)].filter((edge) => edge >= low && edge <= high).sort((a, b) => a - b);
}
