import gammaln from '@stdlib/math-base-special-gammaln';

/**
 * Logarithm of Gamma(a) over its Stirling main term: ln Gamma(a) - ((a - 1/2) ln a - a + ln(2 pi)/2).
 * Kept apart because the main term cancels against powers in the densities; the rest stays exact at a = 1,000,000.
 * @param a above zero
 * Source: Abramowitz and Stegun 1964, 6.1.41.
 */
export function stirlingRest(a: number): number {
  if (a < 12) {
    return gammaln(a) - ((a - 0.5) * Math.log(a) - a + 0.5 * Math.log(2 * Math.PI));
  }
  const b = 1 / (a * a);
  const series =
    1 / 12 -
    b *
      (1 / 360 -
        b * (1 / 1260 - b * (1 / 1680 - b * (1 / 1188 - b * (691 / 360360 - b * (1 / 156))))));
  return series / a;
}

/**
 * u - ln(1 + u), accurate for u near zero and, when 1 + u is given, for u near -1.
 * @param u above -1
 * @param onePlusU the same number plus one, as exactly as the caller knows it
 */
export function logExcess(u: number, onePlusU: number): number {
  if (Math.abs(u) > 0.4) return u - Math.log(onePlusU);
  // ln(1+u) = 2 artanh(r), r = u/(2+u); the odd terms beyond the first are summed, the first joins u without loss.
  const r = u / (2 + u);
  const r2 = r * r;
  let power = r * r2;
  let sum = 0;
  for (let k = 3; k < 80; k += 2) {
    const term = power / k;
    sum += term;
    if (Math.abs(term) < 1e-18 * Math.abs(sum)) break;
    power *= r2;
  }
  return r * u - 2 * sum;
}

/**
 * Deviance part x ln(x/m) + m - x of the binomial and Poisson probabilities, without cancellation.
 * @param x count, at least 0
 * @param m mean, above zero
 * Source: C. Loader, Fast and Accurate Computation of Binomial Probabilities, 2000.
 */
export function devianceTerm(x: number, m: number): number {
  if (x === 0) return m;
  // x ln(x/m) + m - x = x (v - ln(1+v)) with v = (m - x)/x
  return x * logExcess((m - x) / x, m / x);
}
