import { parseDecimal, powerOfTen, ratioToNumber } from './decimal';
import { RadioError, requireFinite, requireNonNegative, requireWithin } from './errors';

/** 2^12 terms of long integers still answer at once; a budget has seven contributions. */
const MOST_TERMS = 12;
/** Values below count as zero, values above its inverse are refused: the integers stay short. */
const LEAST_VALUE = 1e-30;

const atLeast = (value: number): number => (Math.abs(value) < LEAST_VALUE ? 0 : value);

/**
 * P(|S| > limit) for a sum S of independent rectangular contributions on +/-w_i.
 *
 * P(S <= x) = sum over sign vectors s of prod(s) max(0, x + sum s_i w_i)^n / (n! prod 2 w_i), and
 * P(|S| > L) = 2 P(S <= -L). The alternating terms cancel badly in doubles, so the sum is taken in
 * integers on the decimals as written, and rounded once.
 *
 * @param halfWidths w_i, zero or above, at most 12 above zero, any one unit
 * @param limit L in the same unit
 * @returns probability, 0 to 1
 * @throws RadioError `not_finite`, `out_of_range`, `too_many`
 * @see method JCGM 101:2008; the distribution is that of Laplace's sum of uniforms
 */
export function rectangularSumBeyond(halfWidths: readonly number[], limit: number): number {
  requireFinite(limit, 'limit');
  const widths = halfWidths
    .map((w) => atLeast(requireNonNegative(w, 'halfWidths')))
    .filter((w) => requireWithin(w, 0, 1 / LEAST_VALUE, 'halfWidths') > 0);
  if (limit < 0) return 1;
  if (widths.length === 0) return 0;
  if (widths.length > MOST_TERMS) {
    throw new RadioError('too_many', 'halfWidths', `must hold at most ${MOST_TERMS} contributions`);
  }
  if (limit >= widths.reduce((sum, w) => sum + w, 0) * (1 + 1e-9)) return 0;
  const decimals = [atLeast(limit), ...widths].map((value) => parseDecimal(String(value)));
  const scale = Math.max(...decimals.map((value) => value.scale));
  const [limitUnits = 0n, ...w] = decimals.map((d) => d.units * powerOfTen(scale - d.scale));

  let sums: { reach: bigint; negative: boolean }[] = [{ reach: -limitUnits, negative: false }];
  for (const width of w) {
    sums = sums.flatMap(({ reach, negative }) => [
      { reach: reach + width, negative },
      { reach: reach - width, negative: !negative },
    ]);
  }
  const power = BigInt(w.length);
  let numerator = 0n;
  for (const { reach, negative } of sums) {
    if (reach > 0n) numerator += negative ? -(reach ** power) : reach ** power;
  }
  let denominator = 1n;
  w.forEach((width, i) => (denominator *= 2n * width * BigInt(i + 1)));
  return ratioToNumber(2n * numerator, denominator);
}
