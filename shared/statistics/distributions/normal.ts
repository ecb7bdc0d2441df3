import erfc from '@stdlib/math-base-special-erfc';
import erfcx from '@stdlib/math-base-special-erfcx';
import { requireFinite, requireOpenShare } from '../checks';

const ROOT_TWO_PI = Math.sqrt(2 * Math.PI);

/** Density of the standard normal distribution, exp(-z^2/2)/sqrt(2 pi). @throws StatisticsError when z is not finite */
export function normalDensity(z: number): number {
  requireFinite(z, 'z');
  return Math.exp(-0.5 * z * z) / ROOT_TWO_PI;
}

/** P(Z <= z) of the standard normal distribution, erfc(-z/sqrt 2)/2. @throws StatisticsError when z is NaN */
export function normalCdf(z: number): number {
  if (Number.isNaN(z)) requireFinite(z, 'z');
  return 0.5 * erfc(-z * Math.SQRT1_2);
}

/** P(Z > z), with full relative precision in the tail (down to about 1e-308). @throws StatisticsError when z is NaN */
export function normalUpperTail(z: number): number {
  return normalCdf(-z);
}

/** ln P(Z <= z), finite even where the probability itself underflows. */
export function normalLogCdf(z: number): number {
  if (z > -1) return Math.log1p(-0.5 * erfc(z * Math.SQRT1_2));
  return -0.5 * z * z + Math.log(0.5 * erfcx(-z * Math.SQRT1_2));
}

/**
 * z with P(Z <= z) = p.
 * A rational guess is polished by Newton's method on the logarithm of the tail, which converges for p down to 1e-308.
 * @param p strictly between 0 and 1
 * @returns z, relative error about 1e-15
 * @throws StatisticsError when p is outside (0, 1)
 * Source of the guess: Abramowitz and Stegun 1964, 26.2.23.
 */
export function normalQuantile(p: number): number {
  requireOpenShare(p, 'p');
  return p <= 0.5 ? lowerQuantile(p) : -lowerQuantile(1 - p);
}

/** z with P(Z > z) = q, for tails too small to be written as 1 - q. @throws StatisticsError when q is outside (0, 1) */
export function normalUpperQuantile(q: number): number {
  return -normalQuantile(q);
}

function lowerQuantile(p: number): number {
  if (p === 0.5) return 0;
  const logP = Math.log(p);
  const t = Math.sqrt(-2 * logP);
  if (p > 0.4) return centralQuantile(p - 0.5);
  let z =
    (2.515517 + t * (0.802853 + t * 0.010328)) /
      (1 + t * (1.432788 + t * (0.189269 + t * 0.001308))) -
    t;
  for (let i = 0; i < 4; i += 1) {
    // d/dz ln Phi(z) = phi/Phi = sqrt(2/pi) / erfcx(-z/sqrt 2)
    const scaled = erfcx(-z * Math.SQRT1_2);
    const gap = -0.5 * z * z + Math.log(0.5 * scaled) - logP;
    const step = gap * scaled * Math.sqrt(Math.PI / 2);
    z -= step;
    if (Math.abs(step) <= 1e-9 * Math.abs(z)) break;
  }
  return z;
}

/** Next to the median the logarithm would lose digits: Newton on the series of P(0 < Z < z) instead (26.2.11). */
function centralQuantile(offset: number): number {
  let z = offset * ROOT_TWO_PI;
  for (let i = 0; i < 6; i += 1) {
    let term = z;
    let sum = z;
    for (let k = 3; Math.abs(term) > 1e-18 * Math.abs(sum); k += 2) {
      term *= (z * z) / k;
      sum += term;
    }
    const step = sum - (offset * ROOT_TWO_PI) / Math.exp(-0.5 * z * z);
    z -= step;
    if (Math.abs(step) <= 1e-9 * Math.abs(z)) break;
  }
  return z;
}
