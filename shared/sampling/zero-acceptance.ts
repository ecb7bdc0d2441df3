import { requireOpenShare, requireWhole } from '../statistics/checks';
import { hypergeometricProbability } from '../statistics/distributions/hypergeometric';

export interface ZeroAcceptanceSample {
  sampleSize: number;
  /** Units in a lot of exactly the limiting quality, rounded up to whole units. */
  limitingUnits: number;
  /** Probability of accepting such a lot with this sample; at most the risk asked for. */
  consumersRiskReached: number;
}

/**
 * Smallest sample n such that a lot with D = ceil(limitingShare x lotSize) nonconforming units shows none of them
 * with probability at most consumersRisk: C(N - D, n) / C(N, n) <= risk. Computed exactly for each lot size.
 * @param lotSize N, units
 * @param limitingShare limiting quality as a share, strictly between 0 and 1
 * @param consumersRisk strictly between 0 and 1
 * @throws StatisticsError when an argument is outside its range
 * Source: exact hypergeometric distribution.
 */
export function zeroAcceptanceSample(
  lotSize: number,
  limitingShare: number,
  consumersRisk: number,
): ZeroAcceptanceSample {
  requireWhole(lotSize, 'lotSize', 1);
  requireOpenShare(limitingShare, 'limitingShare');
  requireOpenShare(consumersRisk, 'consumersRisk');
  // 0.05 x 1200 is 60.00000000000001 in binary; that is not a sixty-first unit.
  const limitingUnits = Math.max(1, Math.ceil(limitingShare * lotSize - 1e-9));
  const missesAll = (sampleSize: number) =>
    hypergeometricProbability(0, lotSize, limitingUnits, sampleSize);
  const allowed = consumersRisk * (1 + 1e-12);
  let tooFew = 0;
  let enough = lotSize;
  while (enough - tooFew > 1) {
    const middle = Math.floor((tooFew + enough) / 2);
    if (missesAll(middle) <= allowed) enough = middle;
    else tooFew = middle;
  }
  return { sampleSize: enough, limitingUnits, consumersRiskReached: missesAll(enough) };
}
