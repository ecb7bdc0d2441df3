import { StatisticsError } from '../errors';

/**
 * Root of a continuous function inside a bracket, by Brent's method (inverse quadratic steps kept safe by bisection).
 * @param f function whose signs at `low` and `high` differ
 * @returns x with f(x) = 0 to about machine precision relative to x
 * @throws StatisticsError `no_solution` when the bracket does not enclose a root
 * Source: R. P. Brent, Algorithms for Minimization without Derivatives, 1973, chapter 4.
 */
export function rootInBracket(f: (x: number) => number, low: number, high: number): number {
  let a = low;
  let b = high;
  let fa = f(a);
  let fb = f(b);
  if (fa === 0) return a;
  if (fb === 0) return b;
  if (!(fa < 0 !== fb < 0) || Number.isNaN(fa) || Number.isNaN(fb)) {
    throw new StatisticsError(
      'no_solution',
      'bracket',
      `encloses no root between ${low} and ${high}`,
    );
  }
  let c = a;
  let fc = fa;
  let step = b - a;
  let previous = step;
  for (let i = 0; i < 200; i += 1) {
    if (fb < 0 === fc < 0) {
      c = a;
      fc = fa;
      step = b - a;
      previous = step;
    }
    if (Math.abs(fc) < Math.abs(fb)) {
      a = b;
      b = c;
      c = a;
      fa = fb;
      fb = fc;
      fc = fa;
    }
    const tolerance = 2 * Number.EPSILON * Math.abs(b) + Number.MIN_VALUE;
    const half = (c - b) / 2;
    if (Math.abs(half) <= tolerance || fb === 0) return b;
    if (Math.abs(previous) >= tolerance && Math.abs(fa) > Math.abs(fb)) {
      const s = fb / fa;
      let p: number;
      let q: number;
      if (a === c) {
        p = 2 * half * s;
        q = 1 - s;
      } else {
        const r = fb / fc;
        q = fa / fc;
        p = s * (2 * half * q * (q - r) - (b - a) * (r - 1));
        q = (q - 1) * (r - 1) * (s - 1);
      }
      if (p > 0) q = -q;
      else p = -p;
      if (2 * p < Math.min(3 * half * q - Math.abs(tolerance * q), Math.abs(previous * q))) {
        previous = step;
        step = p / q;
      } else {
        step = half;
        previous = half;
      }
    } else {
      step = half;
      previous = half;
    }
    a = b;
    fa = fb;
    b += Math.abs(step) > tolerance ? step : Math.sign(half) * tolerance;
    fb = f(b);
  }
  return b;
}

/**
 * Root of a monotone function from a starting guess: the bracket grows by doubling until the sign changes.
 * @throws StatisticsError `no_solution` when no sign change is found
 */
export function rootFromGuess(f: (x: number) => number, guess: number, firstStep: number): number {
  const atGuess = f(guess);
  if (atGuess === 0) return guess;
  let step = firstStep;
  let below = guess;
  let above = guess;
  for (let i = 0; i < 80; i += 1) {
    const nextBelow = below - step;
    const nextAbove = above + step;
    if (f(nextAbove) < 0 !== atGuess < 0) return rootInBracket(f, above, nextAbove);
    if (f(nextBelow) < 0 !== atGuess < 0) return rootInBracket(f, nextBelow, below);
    below = nextBelow;
    above = nextAbove;
    step *= 2;
  }
  throw new StatisticsError('no_solution', 'guess', `leads to no root, started at ${guess}`);
}
