import fc from 'fast-check';
import { describe, expect, it, vi } from 'vitest';
import {
  andersonDarling,
  assessLimits,
  capability,
  clopperPearson,
  countBeyond,
  describeOffsets,
  generalisedEsd,
  histogram,
  lotPairExceedance,
  moments,
  oneSidedToleranceFactor,
  plugInShare,
  quantile,
  QUANTILE_TYPES,
  type QuantileType,
  shareUpperBound,
  sortedAscending,
  twoClusters,
  unbiasedShare,
} from '@shared/statistics';

// A busy machine may take its time; nothing here is about speed.
vi.setConfig({ testTimeout: 60_000 });

/** Offsets on a grid of 0.001 ppm, as a counter gives them, at least two of them different. */
const offsets = (least = 3, most = 80) =>
  fc
    .array(fc.integer({ min: -40_000, max: 40_000 }), { minLength: least, maxLength: most })
    .filter((values) => new Set(values).size > 1)
    .map((values) => Float64Array.from(values, (value) => value / 1000));
const shift = fc.integer({ min: -1000, max: 1000 });
const scale = fc.double({ min: 0.01, max: 100, noNaN: true });
const limitPair = fc
  .tuple(fc.integer({ min: -50, max: 0 }), fc.integer({ min: 1, max: 50 }))
  .map(([low, high]) => ({ low, high }));
const close = (actual: number, expected: number, relative = 1e-8) =>
  expect(Math.abs(actual - expected)).toBeLessThanOrEqual(
    relative * Math.max(1, Math.abs(expected), Math.abs(actual)),
  );

describe('shifting and scaling the readings', () => {
  it('moves mean, spread and quantiles as it must and leaves shape, normality and outliers alone', () => {
    fc.assert(
      fc.property(offsets(11), shift, scale, (values, by, times) => {
        const before = moments(values);
        fc.pre(before.sd > 0.05);
        const moved = values.map((value) => value * times + by);
        const after = moments(moved);
        close(after.mean, before.mean * times + by);
        close(after.sd / times, before.sd);
        close(after.skewness!, before.skewness!, 1e-5);
        close(after.excessKurtosis!, before.excessKurtosis!, 1e-5);
        const sorted = sortedAscending(values);
        const sortedMoved = sortedAscending(moved);
        close(quantile(sortedMoved, 0.3), quantile(sorted, 0.3) * times + by);
        const test = andersonDarling(sorted, before.mean, before.sd);
        close(andersonDarling(sortedMoved, after.mean, after.sd).a2, test.a2, 1e-6);
        const esd = generalisedEsd(sorted, 3);
        const esdMoved = generalisedEsd(sortedMoved, 3);
        esd.steps.forEach(({ r }, i) => close(esdMoved.steps[i]!.r, r, 1e-6));
      }),
    );
  });

  it('leaves the share beyond limits alone when the limits move along', () => {
    fc.assert(
      fc.property(offsets(4), limitPair, shift, scale, (values, limits, by, times) => {
        const summary = moments(values);
        fc.pre(summary.sd > 0.05);
        const moved = { n: summary.n, mean: summary.mean * times + by, sd: summary.sd * times };
        const along = { low: limits.low * times + by, high: limits.high * times + by };
        for (const share of [plugInShare, unbiasedShare, shareUpperBound]) {
          close(share(moved, along), share(summary, limits), 1e-7);
        }
        close(capability(moved, along).ppk, capability(summary, limits).ppk, 1e-7);
      }),
      { numRuns: 60 },
    );
  });

  it('mirrors: turning all signs swaps the tails', () => {
    fc.assert(
      fc.property(offsets(4), limitPair, (values, limits) => {
        const summary = moments(values);
        const turned = moments(values.map((value) => -value));
        const swapped = { low: -limits.high, high: -limits.low };
        close(unbiasedShare(turned, swapped), unbiasedShare(summary, limits));
        close(shareUpperBound(turned, swapped), shareUpperBound(summary, limits));
        close(turned.skewness!, -summary.skewness!);
        const found = countBeyond(sortedAscending(values), limits);
        const foundTurned = countBeyond(sortedAscending(values.map((value) => -value)), swapped);
        expect([foundTurned.below, foundTurned.above]).toEqual([found.above, found.below]);
      }),
      { numRuns: 60 },
    );
  });
});

describe('wider limits', () => {
  it('never raise a share, a bound or lower the capability; all shares stay in [0, 1]', () => {
    fc.assert(
      fc.property(offsets(3), limitPair, fc.integer({ min: 1, max: 30 }), (values, limits, by) => {
        const lot = describeOffsets(values);
        const tight = assessLimits(lot, limits);
        const wide = assessLimits(lot, { low: limits.low - by, high: limits.high + by });
        const pairs: [number, number][] = [
          [wide.observed.share, tight.observed.share],
          [wide.observed.upperBound, tight.observed.upperBound],
          [wide.normal!.plugIn, tight.normal!.plugIn],
          [wide.normal!.unbiased!, tight.normal!.unbiased!],
          [wide.normal!.upperBound, tight.normal!.upperBound],
        ];
        for (const [less, more] of pairs) {
          expect(less).toBeLessThanOrEqual(more + 1e-12);
          expect(less).toBeGreaterThanOrEqual(0);
          expect(more).toBeLessThanOrEqual(1 + 1e-15);
        }
        expect(wide.capability!.ppk).toBeGreaterThan(tight.capability!.ppk);
      }),
      { numRuns: 60 },
    );
  });

  it('two limits bound more than either alone', () => {
    fc.assert(
      fc.property(offsets(3), limitPair, (values, limits) => {
        const summary = moments(values);
        const both = shareUpperBound(summary, limits);
        expect(both).toBeGreaterThanOrEqual(shareUpperBound(summary, { ...limits, low: null }));
        expect(both).toBeGreaterThanOrEqual(shareUpperBound(summary, { ...limits, high: null }));
      }),
      { numRuns: 60 },
    );
  });
});

describe('confidence', () => {
  it('widens exact binomial bounds, which bracket the share found', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 1, max: 2000 }),
        fc.double({ min: 0, max: 1, noNaN: true }),
        (n, part) => {
          const found = Math.round(n * part);
          const at90 = clopperPearson(found, n, 0.9);
          const at99 = clopperPearson(found, n, 0.99);
          expect(at99.low).toBeLessThanOrEqual(at90.low);
          expect(at99.high).toBeGreaterThanOrEqual(at90.high);
          expect(at90.low).toBeLessThanOrEqual(found / n);
          expect(at90.upperBound).toBeGreaterThanOrEqual(found / n);
          // The one-sided bound at 95 % is the upper end of the two-sided interval at 90 %.
          close(clopperPearson(found, n, 0.95).upperBound, at90.high, 1e-12);
        },
      ),
    );
  });

  it('raises tolerance factors; more units lower them', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 3, max: 300 }),
        fc.double({ min: 0.6, max: 0.999, noNaN: true }),
        (n, share) => {
          const k = oneSidedToleranceFactor(n, share, 0.95);
          expect(oneSidedToleranceFactor(n, share, 0.99)).toBeGreaterThan(k);
          expect(oneSidedToleranceFactor(n + 1, share, 0.95)).toBeLessThan(k);
        },
      ),
      { numRuns: 40 },
    );
  });
});

describe('sorting, quantiles and histograms', () => {
  it('sorts large lots as the engine does, with ties and far values', () => {
    fc.assert(
      fc.property(
        fc.integer(),
        fc.constantFrom(1e9, 1000, 10, 1),
        fc.constantFrom(0, 1, 1e12),
        (seed, grid, far) => {
          let state = seed >>> 0;
          const values = Float64Array.from({ length: 6000 }, (_, i) => {
            state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
            const u = (state + 0.5) / 2 ** 32;
            // Adding zero turns -0 into 0: the order of the two means nothing here.
            return i % 1000 === 7 ? far * u : Math.round(Math.log(u / (1 - u)) * grid) / grid + 0;
          });
          const copy = Float64Array.from(values);
          expect(sortedAscending(values)).toEqual(Float64Array.from(values).sort());
          expect(values).toEqual(copy);
        },
      ),
      { numRuns: 12 },
    );
  });

  it('quantiles of every type rise with the share and stay inside the extremes', () => {
    const types = Object.keys(QUANTILE_TYPES) as QuantileType[];
    fc.assert(
      fc.property(offsets(1 + 1), fc.constantFrom(...types), (values, type) => {
        const sorted = sortedAscending(values);
        let before = sorted[0]!;
        for (let p = 0; p <= 1; p += 1 / 64) {
          const here = quantile(sorted, p, type);
          expect(here).toBeGreaterThanOrEqual(before - 1e-12);
          before = here;
        }
        expect(before).toBeLessThanOrEqual(sorted[sorted.length - 1]! + 1e-12);
      }),
    );
  });

  it('histogram counts every unit once and agrees with the count beyond at each limit', () => {
    const rules = fc.constantFrom(
      'freedman-diaconis' as const,
      'scott' as const,
      { width: 0.5 },
      { width: 0.001 },
    );
    const wideLimits = fc
      .tuple(fc.integer({ min: -45_000, max: 45_000 }), fc.integer({ min: 1, max: 60_000 }))
      .map(([low, span]) => ({ low: low / 1000, high: (low + span) / 1000 }));
    fc.assert(
      fc.property(
        offsets(2),
        wideLimits,
        limitPair,
        rules,
        fc.boolean(),
        (values, one, other, rule, onLimit) => {
          if (onLimit) values.set([one.low, one.high].slice(0, values.length));
          const sorted = sortedAscending(values);
          const { edges, counts } = histogram(sorted, { rule, limits: [one, other] });
          expect(counts.length).toBe(edges.length - 1);
          expect(counts.length).toBeLessThanOrEqual(400);
          expect(counts.reduce((sum, count) => sum + count, 0)).toBe(sorted.length);
          expect(counts.every((count) => count >= 0)).toBe(true);
          edges.slice(1).forEach((edge, i) => expect(edge).toBeGreaterThan(edges[i]!));
          for (const limits of [one, other]) {
            const { below, above } = countBeyond(sorted, limits);
            const filled = (from: number, to: number) =>
              counts.reduce(
                (sum, count, i) => (edges[i]! >= from && edges[i + 1]! <= to ? sum + count : sum),
                0,
              );
            // A limit outside all bins has no unit on its far side; inside, it is an edge. A unit on a limit that is
            // low for one pair and high for the other can lie on one side only.
            if (one.low === other.high || one.high === other.low) continue;
            expect(filled(-Infinity, limits.low)).toBe(below);
            expect(filled(limits.high, Infinity)).toBe(above);
          }
        },
      ),
      {
        numRuns: 300,
        // Once found: the last bin reached past a limit just out of reach of the readings.
        examples: [
          [
            Float64Array.of(20.001, 0),
            { low: 35.876, high: 35.877 },
            { low: 0, high: 18 },
            'freedman-diaconis',
            false,
          ],
        ],
      },
    );
  });

  it('pairs beyond are what counting each pair gives', () => {
    fc.assert(
      fc.property(
        offsets(2, 20),
        offsets(2, 20),
        fc.integer({ min: 0, max: 60 }),
        (a, b, limit) => {
          let beyond = 0;
          for (const x of a) for (const y of b) if (Math.abs(x - y) > limit) beyond += 1;
          const swept = lotPairExceedance(sortedAscending(a), sortedAscending(b), limit);
          expect(swept.beyond).toBe(beyond);
        },
      ),
    );
  });

  it('the cluster search neither fails nor depends on shift and scale', () => {
    fc.assert(
      fc.property(offsets(12, 60), shift, (values, by) => {
        const here = twoClusters(sortedAscending(values));
        const there = twoClusters(sortedAscending(values.map((value) => 2 * value + 2 * by)));
        expect(there.mixed).toBe(here.mixed);
      }),
      { numRuns: 40 },
    );
  });
});
