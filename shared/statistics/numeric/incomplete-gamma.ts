import { logExcess, stirlingRest } from './stirling';

/** Lower and upper regularised incomplete gamma function; the smaller one is computed, the other is its complement. */
export interface GammaTails {
  lower: number;
  upper: number;
}

/**
 * P(a, x) and Q(a, x): series below the mean, continued fraction above, common factor through Stirling's rest
 * so that a = 500,000 keeps 13 digits. (The library function at hand is off by 1 % for a above about 1,000.)
 * @param a shape, above zero
 * @param x at least zero
 * Source: Abramowitz and Stegun 1964, 6.5.29 and 6.5.31; modified Lentz evaluation.
 */
export function gammaTails(a: number, x: number): GammaTails {
  if (x <= 0) return { lower: 0, upper: 1 };
  // Beyond this the ratio x/a overflows; the upper tail vanished long before.
  if (!(x < 1e300 * Math.min(1, a))) return { lower: 1, upper: 0 };
  // x^a e^-x / Gamma(a) = sqrt(a/(2 pi)) exp(-a (u - ln(1+u)) - rest(a)), u = (x - a)/a
  const factor =
    Math.sqrt(a / (2 * Math.PI)) * Math.exp(-a * logExcess((x - a) / a, x / a) - stirlingRest(a));
  if (x < a + 1) {
    let term = 1 / a;
    let sum = term;
    for (let k = 1; k < 1e7; k += 1) {
      term *= x / (a + k);
      sum += term;
      if (term < sum * 1e-17) break;
    }
    const lower = Math.min(1, factor * sum);
    return { lower, upper: 1 - lower };
  }
  let b = x + 1 - a;
  let c = 1e300;
  let d = 1 / b;
  let fraction = d;
  for (let k = 1; k < 1e7; k += 1) {
    const an = -k * (k - a);
    b += 2;
    d = 1 / (an * d + b);
    c = b + an / c;
    const change = c * d;
    fraction *= change;
    if (Math.abs(change - 1) < 2e-16) break;
  }
  const upper = Math.min(1, factor * fraction);
  return { lower: 1 - upper, upper };
}
