import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { type FarEnd, linkShares, measuredPairs, RadioError } from '@shared/radio';
import { bernsteinUpper, chernoffUpper, shareUpperBound } from '@shared/radio/share-bound';

const ppm = fc.integer({ min: -4000, max: 4000 }).map((v) => v / 100);
const lot = fc.array(ppm, { minLength: 1, maxLength: 60 });
const farEnd: fc.Arbitrary<FarEnd> = fc.oneof(
  fc.record({
    model: fc.constant('uniform' as const),
    tolerancePpm: fc.integer({ min: 0, max: 40 }),
  }),
  fc.record({
    model: fc.constant('normal' as const),
    meanPpm: ppm,
    sdPpm: fc.integer({ min: 0, max: 300 }).map((v) => v / 10),
  }),
  fc.record({ model: fc.constant('measured' as const), offsetsPpm: lot }),
);
const doppler = fc.record({
  model: fc.constantFrom('worst-case' as const, 'uniform' as const),
  halfWidthPpm: fc.integer({ min: 0, max: 50 }).map((v) => v / 10),
});
const limit = fc.integer({ min: 0, max: 800 }).map((v) => v / 10);

const question = fc.record({
  unitsPpm: lot,
  farEnd,
  doppler,
  symbolRateRegionPpm: limit,
  frontEndWholePpm: limit,
});

/** A repeatable stream of uniforms, so that the simulation is the same in every run. */
function uniforms(seed: number) {
  let state = seed;
  return () => {
    state = (48271 * state) % 2147483647;
    return state / 2147483647;
  };
}

describe('share of links in each region', () => {
  it('shares lie in [0, 1], sum to one, and bounds contain them', () => {
    fc.assert(
      fc.property(question, (q) => {
        const shares = linkShares(q);
        const { symbolRate, oversampled, outsideFrontEnd, beyondSymbolRate } = shares;
        expect(symbolRate.share + oversampled.share + outsideFrontEnd.share).toBeCloseTo(1, 9);
        for (const { share, upperBound } of [oversampled, outsideFrontEnd, beyondSymbolRate]) {
          expect(share).toBeGreaterThanOrEqual(0);
          expect(upperBound).toBeGreaterThanOrEqual(share);
          expect(upperBound).toBeLessThanOrEqual(1);
        }
        expect(symbolRate.lowerBound).toBeLessThanOrEqual(symbolRate.share);
      }),
    );
  });

  it('fewer links leave a wider region', () => {
    fc.assert(
      fc.property(question, fc.integer({ min: 0, max: 20 }), (q, wider) => {
        const before = linkShares({ ...q, frontEndWholePpm: 100 });
        const after = linkShares({
          ...q,
          symbolRateRegionPpm: q.symbolRateRegionPpm + wider,
          frontEndWholePpm: 100,
        });
        expect(after.beyondSymbolRate.share).toBeLessThanOrEqual(
          before.beyondSymbolRate.share + 1e-12,
        );
      }),
    );
  });

  it('mirrors: units and far ends of opposite sign make the same shares', () => {
    fc.assert(
      fc.property(lot, lot, limit, doppler, (units, others, symbolRateRegionPpm, motion) => {
        const ask = (sign: number) =>
          linkShares({
            unitsPpm: units.map((u) => sign * u),
            farEnd: { model: 'measured', offsetsPpm: others.map((b) => sign * b) },
            doppler: motion,
            symbolRateRegionPpm,
            frontEndWholePpm: 200,
          }).beyondSymbolRate.share;
        expect(ask(-1)).toBeCloseTo(ask(1), 9);
      }),
    );
  });

  it('shifts: both ends moved alike leave every difference as it was', () => {
    fc.assert(
      fc.property(
        lot,
        fc.integer({ min: -16, max: 16 }),
        limit,
        (units, shift, symbolRateRegionPpm) => {
          const ask = (by: number) =>
            linkShares({
              unitsPpm: units.map((u) => u + by),
              farEnd: { model: 'normal', meanPpm: by, sdPpm: 4 },
              symbolRateRegionPpm,
              frontEndWholePpm: 200,
            }).beyondSymbolRate.share;
          expect(ask(shift)).toBeCloseTo(ask(0), 10);
        },
      ),
    );
  });

  it('agrees with counting pairs when the far end is a measured lot', () => {
    fc.assert(
      fc.property(lot, lot, limit, (units, others, symbolRateRegionPpm) => {
        const { share } = linkShares({
          unitsPpm: units,
          farEnd: { model: 'measured', offsetsPpm: others },
          symbolRateRegionPpm,
          frontEndWholePpm: 200,
        }).beyondSymbolRate;
        let beyond = 0;
        for (const a of units) {
          for (const b of others) if (Math.abs(a - b) > symbolRateRegionPpm) beyond += 1;
        }
        expect(share).toBeCloseTo(beyond / units.length / others.length, 12);
        expect(measuredPairs(units, others, symbolRateRegionPpm).pairsBeyond).toBe(beyond);
      }),
    );
  });

  it('agrees with a fine grid of far ends and motion', () => {
    const spread = (halfWidth: number, count: number) =>
      Array.from({ length: count }, (_, i) => halfWidth * ((2 * i + 1) / count - 1));
    fc.assert(
      fc.property(
        lot,
        fc.integer({ min: 1, max: 40 }),
        fc.integer({ min: 1, max: 5 }),
        limit,
        (units, tolerancePpm, d, region) => {
          const base = { unitsPpm: units, symbolRateRegionPpm: region, frontEndWholePpm: 200 };
          const motion = { model: 'uniform', halfWidthPpm: d } as const;
          const exact = linkShares({
            ...base,
            farEnd: { model: 'uniform', tolerancePpm },
            doppler: motion,
          });
          const grid = linkShares({
            ...base,
            farEnd: { model: 'measured', offsetsPpm: spread(tolerancePpm, 4000) },
            doppler: motion,
          });
          expect(grid.beyondSymbolRate.share).toBeCloseTo(exact.beyondSymbolRate.share, 3);
        },
      ),
      { numRuns: 40 },
    );
  });

  it('tabulated shares of a large lot are those of each unit alone', () => {
    const next = uniforms(7);
    const units = Float64Array.from({ length: 30_000 }, () => 30 * (next() - 0.5)).sort();
    const ask = (unitsPpm: Float64Array) =>
      linkShares({
        unitsPpm,
        farEnd: { model: 'normal', meanPpm: 1, sdPpm: 3 },
        doppler: { model: 'uniform', halfWidthPpm: 0.7 },
        symbolRateRegionPpm: 12,
        frontEndWholePpm: 25,
      });
    const whole = ask(units);
    let first = 0;
    let second = 0;
    for (let start = 0; start < units.length; start += 10_000) {
      const part = ask(units.subarray(start, start + 10_000));
      first += part.beyondSymbolRate.share / 3;
      second += part.outsideFrontEnd.share / 3;
    }
    expect(whole.beyondSymbolRate.share / first).toBeCloseTo(1, 9);
    expect(whole.outsideFrontEnd.share / second).toBeCloseTo(1, 7);
  });

  it('motion and drift against the link only make more links leave', () => {
    fc.assert(
      fc.property(question, (q) => {
        const still = linkShares({ ...q, doppler: undefined }).beyondSymbolRate.share;
        const worst = linkShares({
          ...q,
          doppler: { ...q.doppler, model: 'worst-case' },
          serviceDriftPpm: 1,
        });
        expect(worst.beyondSymbolRate.share).toBeGreaterThanOrEqual(still - 1e-12);
      }),
    );
  });

  it('a front end too narrow for the signal loses every link', () => {
    const shares = linkShares({
      unitsPpm: [0, 1],
      farEnd: { model: 'uniform', tolerancePpm: 1 },
      symbolRateRegionPpm: 10,
      frontEndWholePpm: -1,
    });
    expect(shares.outsideFrontEnd.share).toBe(1);
  });

  it('with every unit measured the share is known, not bounded', () => {
    const shares = linkShares({
      unitsPpm: [0, 8, -9],
      farEnd: { model: 'uniform', tolerancePpm: 10 },
      symbolRateRegionPpm: 15,
      frontEndWholePpm: 30,
      wholeLot: true,
    });
    expect(shares.beyondSymbolRate.upperBound).toBe(shares.beyondSymbolRate.share);
    // 8 + 10 is 3 beyond 15 out of 20, 9 + 10 is 4 out of 20.
    expect(shares.beyondSymbolRate.share).toBeCloseTo((0 + 3 / 20 + 4 / 20) / 3, 12);
  });

  it('names what is wrong', () => {
    const base = {
      farEnd: { model: 'uniform', tolerancePpm: 1 },
      symbolRateRegionPpm: 1,
      frontEndWholePpm: 2,
    } as const;
    expect(() => linkShares({ ...base, unitsPpm: [] })).toThrow(RadioError);
    expect(() => linkShares({ ...base, unitsPpm: [1, NaN] })).toThrow(RadioError);
    expect(() => linkShares({ ...base, unitsPpm: [1, -Infinity] })).toThrow(RadioError);
    expect(() => linkShares({ ...base, unitsPpm: [1], confidence: 1.2 })).toThrow(RadioError);
    expect(() =>
      linkShares({ ...base, unitsPpm: [1], farEnd: { model: 'uniform', tolerancePpm: -1 } }),
    ).toThrow(RadioError);
  });
});

describe('upper bound of a share', () => {
  it('of no event in n is 1 - risk^(1/n), as Clopper and Pearson', () => {
    expect(chernoffUpper(0, 60, 0.05)).toBeCloseTo(1 - 0.05 ** (1 / 60), 12);
  });

  it('profits from many units that all have the same small share', () => {
    const { upper, method } = shareUpperBound(0.05, 0.0001, 100_000);
    expect(method).toBe('empirical-bernstein');
    expect(upper).toBeLessThan(0.0505);
    expect(shareUpperBound(0.05, 0.0475, 200).method).toBe('chernoff-hoeffding');
  });

  it('falls with more units and rises with the share', () => {
    const share = fc.double({ min: 0, max: 1, noNaN: true });
    fc.assert(
      fc.property(share, share, fc.integer({ min: 1, max: 10_000 }), (p, q, n) => {
        expect(chernoffUpper(p, n + 1, 0.05)).toBeLessThanOrEqual(
          chernoffUpper(p, n, 0.05) + 1e-15,
        );
        expect(chernoffUpper(Math.min(p, q), n, 0.05)).toBeLessThanOrEqual(
          chernoffUpper(Math.max(p, q), n, 0.05) + 1e-12,
        );
        expect(bernsteinUpper(p, 0, n + 2, 0.05)).toBeLessThanOrEqual(
          bernsteinUpper(p, 0, n + 1, 0.05),
        );
      }),
    );
  });

  // 2000 simulated lots each; a sound 95 % bound may miss the true share in 5 % of them, and these
  // bounds are known to miss it far less often.
  it.each([
    ['all or nothing, one in fifty', (u: number) => (u < 0.02 ? 1 : 0), 0.02],
    ['all or nothing, one in three', (u: number) => (u < 1 / 3 ? 1 : 0), 1 / 3],
    ['spread evenly', (u: number) => u, 0.5],
    ['a little of everything', (u: number) => u ** 4, 0.2],
  ])('contains the true share in at least 95 of 100 lots: %s', (_name, draw, truth) => {
    const next = uniforms(12345);
    let missed = 0;
    for (let trial = 0; trial < 2000; trial += 1) {
      const values = Array.from({ length: 125 }, () => draw(next()));
      const mean = values.reduce((s, v) => s + v, 0) / values.length;
      const variance = values.reduce((s, v) => s + (v - mean) ** 2, 0) / (values.length - 1);
      if (shareUpperBound(mean, variance, values.length).upper < truth) missed += 1;
    }
    expect(missed / 2000).toBeLessThanOrEqual(0.05);
  });
});
