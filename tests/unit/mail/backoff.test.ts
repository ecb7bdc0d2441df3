import fc from 'fast-check';
import { expect, it } from 'vitest';
import { greatestTries, waitSeconds } from '../../../server/mail/backoff';

it('doubles from twenty seconds up to six hours', () => {
  const middle = (tries: number) => waitSeconds(tries, 0.5);
  expect([1, 2, 3, 4].map(middle)).toEqual([20, 40, 80, 160]);
  expect(middle(30)).toBe(6 * 3600);
});

it('keeps trying through a night, and ends', () => {
  let total = 0;
  for (let tries = 1; tries < greatestTries; tries++) total += waitSeconds(tries, 0.5);
  expect(total / 3600).toBeGreaterThan(8);
  expect(total / 3600).toBeLessThan(24);
});

it('spreads by a quarter either side', () => {
  fc.assert(
    fc.property(
      fc.integer({ min: 1, max: 40 }),
      fc.double({ min: 0, max: 1, noNaN: true }),
      (tries, random) => {
        const middle = waitSeconds(tries, 0.5);
        const wait = waitSeconds(tries, random);
        expect(wait).toBeGreaterThanOrEqual(middle * 0.75);
        expect(wait).toBeLessThanOrEqual(middle * 1.25);
      },
    ),
  );
});
