import { describe, expect, it } from 'vitest';
import { lag1Autocorrelation, moments } from '@shared/statistics/moments';
import file from '../data/statistics/nist-strd.json';
import { expectWithin } from './cases';

/** The first digits of pi by Machin's formula, 16 arctan(1/5) - 4 arctan(1/239), so that the data need not be stored. */
function digitsOfPi(count: number): number[] {
  const one = 10n ** BigInt(count + 9);
  const arctanOfOneOver = (x: bigint) => {
    let power = one / x;
    let sum = power;
    for (let k = 3n, sign = -1n; power !== 0n; k += 2n, sign = -sign) {
      power /= x * x;
      sum += (sign * power) / k;
    }
    return sum;
  };
  const pi = 4n * (4n * arctanOfOneOver(5n) - arctanOfOneOver(239n));
  return [...pi.toString().slice(0, count)].map(Number);
}

function readings(input: (typeof file)[number]['input']): Float64Array {
  const { first, repeat, n } = input;
  if (first === undefined) return Float64Array.from(digitsOfPi(5000));
  if (repeat === 0) return Float64Array.from(first);
  const pairs = Array.from({ length: repeat! }, () => first.slice(1)).flat();
  expect(pairs.length + 1).toBe(n);
  return Float64Array.from([first[0]!, ...pairs]);
}

describe('NIST StRD univariate summary statistics', () => {
  it('has four sets', () => expect(file).toHaveLength(4));

  it.each(file)('$id $what', ({ input, expected, tolerance_rel }) => {
    const values = readings(input);
    const { mean, sd } = moments(values);
    expectWithin(mean, expected.mean, tolerance_rel);
    expectWithin(sd, expected.sd, tolerance_rel);
    if (expected.lag1 !== undefined) {
      expectWithin(lag1Autocorrelation(values), expected.lag1, tolerance_rel);
    }
  });

  // NumAcc4, certified mean 10000000.2, sd 0.1, lag-1 -0.999 (from memory); the data as doubles carry 1e-9 of it.
  it('NumAcc4: 10,000,000.2 with a spread of 0.1', () => {
    const pairs = Array.from({ length: 500 }, () => [10000000.1, 10000000.3]).flat();
    const values = Float64Array.from([10000000.2, ...pairs]);
    const { mean, sd } = moments(values);
    expectWithin(mean, 10000000.2, 1e-15);
    expectWithin(sd, 0.1, 1e-8);
    expectWithin(lag1Autocorrelation(values), -0.999, 1e-8);
  });
});
