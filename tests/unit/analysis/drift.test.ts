import { describe, expect, it } from 'vitest';
import fc from 'fast-check';
import { partDrift, radioReceiver, serviceAgeingPpm } from '@shared/analysis/drift';
import { partCriteria, receiverCriteria } from '../../support/lot-fixture';

const ageing = (first: number | null, ten: number | null, years: number) =>
  serviceAgeingPpm({ ageingFirstYearPpm: first, ageingTenYearsPpm: ten }, years);

describe('ageing over a service life', () => {
  it.each([
    [1, 3, 1, 1],
    [1, 3, 10, 3],
    [1, 3, 100, 5],
    [1, 3, Math.sqrt(10), 2],
    [2, null, 5, 10],
    [null, 3, 4, 3],
    [null, 3, 20, 6],
    [null, null, 10, 0],
    [1, 3, 0.5, 0.5],
    // A data sheet whose ten years promise less than its first never comes to less than the first.
    [3, 2, 10, 3],
  ])('first year %s, ten years %s ppm, after %s years: %s ppm', (first, ten, years, expected) => {
    expect(ageing(first, ten, years)).toBeCloseTo(expected, 12);
  });

  it('never falls with the years and never below zero', () => {
    const figure = fc.option(fc.double({ min: 0, max: 20, noNaN: true }), { nil: null });
    const years = fc.double({ min: 0, max: 40, noNaN: true });
    fc.assert(
      fc.property(figure, figure, years, years, (first, ten, a, b) => {
        const [sooner, later] = [Math.min(a, b), Math.max(a, b)];
        expect(ageing(first, ten, sooner)).toBeGreaterThanOrEqual(0);
        expect(ageing(first, ten, later)).toBeGreaterThanOrEqual(ageing(first, ten, sooner));
      }),
    );
  });
});

describe('what the computation takes from the contract', () => {
  it('the drift of a part, in ppm', () => {
    expect(partDrift(partCriteria, 10)).toEqual({
      temperaturePpm: 15,
      ageingPpm: 3,
      supplyPpm: 0.2,
      loadPpm: 0.5,
    });
    expect(partDrift({ ...partCriteria, stabilityPpm: null }, 1).temperaturePpm).toBe(0);
  });

  it('a receiver, in hertz', () => {
    expect(radioReceiver(receiverCriteria)).toMatchObject({
      carrierHz: 868_300_000,
      symbolRateHz: 300_000,
      frontEndBandwidthHz: 500_000,
      pulse: { shape: 'root-raised-cosine', rollOff: 0.35 },
      farEndTolerancePpm: 12,
      greatestSpeedMps: 30,
      serviceLifeYears: 10,
    });
    expect(
      radioReceiver({ ...receiverCriteria, pulse: 'rectangular', rollOff: null }).pulse,
    ).toEqual({ shape: 'rectangular' });
  });
});
