import { sampleKurtosis, sampleSkewness, standardDeviation } from 'simple-statistics';
import { describe, expect, it, vi } from 'vitest';
import {
  andersonDarling,
  assessLimits,
  describeOffsets,
  generalisedEsd,
  histogram,
  moments,
  normalLogCdf,
  shareUpperBound,
  sortedAscending,
  twoClusters,
} from '@shared/statistics';
import { tabulatedNormalLogCdf } from '@shared/statistics/numeric/normal-log-table';
import {
  normalCdf,
  normalQuantile,
  normalUpperTail,
} from '@shared/statistics/distributions/normal';

// A busy machine may take its time; nothing here is about speed.
vi.setConfig({ testTimeout: 60_000 });

/** Repeatable uniform numbers (a linear congruence; good enough to shuffle shapes). */
function source(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    return (state + 0.5) / 2 ** 32;
  };
}

const normalLot = (n: number, seed: number, mean = 0, sd = 1) => {
  const uniform = source(seed);
  return Float64Array.from({ length: n }, () => mean + sd * normalQuantile(uniform()));
};

describe('which figures to trust', () => {
  const limits = { low: -4, high: 4 };

  it('the normal ones for a well-behaved lot of middling size', () => {
    const { trust } = assessLimits(describeOffsets(normalLot(200, 5)), limits);
    expect(trust).toMatchObject({ method: 'normal', reasons: ['looks_normal'] });
  });

  it('the count for a handful of units', () => {
    const { trust } = assessLimits(describeOffsets(normalLot(12, 5)), limits);
    expect(trust).toMatchObject({ method: 'observed', reasons: ['too_few_to_check'] });
    expect(trust.sentence).toMatch(/12\sunits /);
  });

  it('the count for a single unit, without normal figures', () => {
    const assessment = assessLimits(describeOffsets(Float64Array.of(5)), limits);
    expect(assessment).toMatchObject({ normal: null, capability: null });
    expect(assessment.observed).toMatchObject({ count: 1, share: 1, upperBound: 1 });
    expect(assessment.trust.sentence).toMatch(/1\sunit /);
  });

  it('the count when all units agree', () => {
    const lot = describeOffsets(new Float64Array(50).fill(1.5));
    expect(lot).toMatchObject({ sdPpm: 0, normality: null, outliers: null });
    expect(assessLimits(lot, limits).trust.reasons).toEqual(['no_spread']);
  });

  it('the count when one unit lies far out', () => {
    const offsets = normalLot(100, 6);
    offsets[40] = 9;
    const { trust } = assessLimits(describeOffsets(offsets), limits);
    expect(trust.method).toBe('observed');
    expect(trust.reasons[0]).toBe('outliers');
    expect(trust.sentence).toContain('One unit lies');
  });

  it('the count when two kinds of blanks were mixed, and it says so', () => {
    const offsets = normalLot(200, 7);
    for (let i = 0; i < 80; i += 1) offsets[i]! += 7;
    const lot = describeOffsets(offsets);
    expect(lot.clusters!.mixed).toBe(true);
    expect(lot.clusters!.groups![1].share).toBeCloseTo(0.4, 1);
    expect(assessLimits(lot, limits).trust.sentence).toContain('two clusters');
  });

  it('the count for a hundred thousand units with some beyond', () => {
    // Evenly spaced quantiles: as normal as a lot can be.
    const even = Float64Array.from({ length: 100_000 }, (_, i) => normalQuantile((i + 0.5) / 1e5));
    const { trust } = assessLimits(describeOffsets(even), { low: -3, high: 3 });
    expect(trust).toMatchObject({ method: 'observed', reasons: ['count_decides'] });
    expect(trust.sentence).toMatch(/100,000\sunits/);
  });
});

describe('two clusters', () => {
  const warns = (n: number, draw: (uniform: () => number) => number) => {
    let warnings = 0;
    for (let seed = 1; seed <= 40; seed += 1) {
      const uniform = source(seed * 7919);
      const values = Float64Array.from({ length: n }, () => draw(uniform));
      if (twoClusters(values.sort()).mixed) warnings += 1;
    }
    return warnings / 40;
  };
  const normal = (uniform: () => number) => normalQuantile(uniform());

  it('seldom warns of one hump: normal, flat, skewed, heavy-tailed, coarsely read', () => {
    expect(warns(200, normal)).toBeLessThanOrEqual(0.05);
    expect(warns(200, (uniform) => uniform())).toBeLessThanOrEqual(0.05);
    expect(warns(200, (uniform) => -Math.log(uniform()))).toBeLessThanOrEqual(0.05);
    expect(warns(200, (uniform) => normal(uniform) / Math.sqrt(uniform()))).toBeLessThanOrEqual(
      0.05,
    );
    expect(warns(200, (uniform) => Math.round(normal(uniform)))).toBeLessThanOrEqual(0.05);
  });

  it('notices two humps five spreads apart, even one unit in ten', () => {
    expect(warns(200, (uniform) => normal(uniform) + (uniform() < 0.5 ? 5 : 0))).toBe(1);
    expect(warns(1000, (uniform) => normal(uniform) + (uniform() < 0.1 ? 6 : 0))).toBeGreaterThan(
      0.9,
    );
  });
});

describe('the upper bound for two limits', () => {
  const LOTS = 150;

  it('holds in at least 95 of 100 lots wherever the mean lies', () => {
    for (const mean of [0, 0.8, 2]) {
      const truth = normalCdf(-2.5 - mean) + normalUpperTail(2.5 - mean);
      let held = 0;
      for (let seed = 1; seed <= LOTS; seed += 1) {
        const summary = moments(normalLot(25, seed * 104729, mean));
        if (shareUpperBound(summary, { low: -2.5, high: 2.5 }, 0.95) >= truth) held += 1;
      }
      // 95 % less three standard errors of so many trials
      expect(held / LOTS).toBeGreaterThan(0.95 - 3 * Math.sqrt((0.95 * 0.05) / LOTS));
    }
  });
});

describe('numbers by another road', () => {
  const lot = normalLot(500, 11, 3, 0.4);
  const { mean, sd, skewness, excessKurtosis } = moments(lot);
  const sorted = sortedAscending(lot);

  it('simple-statistics gives the same skewness, kurtosis and spread', () => {
    const list = [...lot];
    expect(skewness).toBeCloseTo(sampleSkewness(list), 10);
    expect(excessKurtosis).toBeCloseTo(sampleKurtosis(list), 10);
    expect(sd * Math.sqrt(499 / 500)).toBeCloseTo(standardDeviation(list), 12);
  });

  it('the tabulated logarithm agrees with the direct one everywhere', () => {
    for (let z = -12; z < 10; z += 0.0137) {
      const direct = normalLogCdf(z);
      expect(Math.abs(tabulatedNormalLogCdf(z) - direct)).toBeLessThanOrEqual(
        4e-15 * Math.max(1, -direct),
      );
    }
  });

  it('Anderson-Darling agrees with its formula written out', () => {
    let sum = 0;
    sorted.forEach((value, i) => {
      const low = normalLogCdf((value - mean) / sd);
      const high = normalLogCdf(-(sorted[499 - i]! - mean) / sd);
      sum += (2 * i + 1) * (low + high);
    });
    expect(andersonDarling(sorted, mean, sd).a2).toBeCloseTo(-500 - sum / 500, 10);
  });

  it('generalised ESD keeps its digits after a value a billion spreads away', () => {
    const values = normalLot(60, 12);
    const clean = generalisedEsd(sortedAscending(values), 2);
    const spoiled = generalisedEsd(sortedAscending(Float64Array.of(...values, 1e9)), 3);
    expect(spoiled.steps[0]!.value).toBe(1e9);
    clean.steps.forEach(({ r }, i) => expect(spoiled.steps[i + 1]!.r).toBeCloseTo(r, 10));
  });
});

describe('histograms in special lots', () => {
  it('one bin for units that all agree', () => {
    expect(histogram(new Float64Array(7).fill(2)).counts).toEqual([7]);
  });

  it('a unit on a limit is inside, on either side', () => {
    const sorted = Float64Array.of(-10, -10, 10, 10, 10.5);
    const { edges, counts } = histogram(sorted, { limits: [{ low: -10, high: 10 }] });
    const inside = counts.filter((_, i) => edges[i]! >= -10 && edges[i + 1]! <= 10);
    expect(inside.reduce((sum, count) => sum + count, 0)).toBe(4);
  });

  it('keeps the middle fine when one reading is absurd', () => {
    const values = normalLot(500, 13);
    values[3] = 1e6;
    const { edges, counts } = histogram(sortedAscending(values), {
      limits: [{ low: -10, high: 10 }],
    });
    expect(counts.filter((count) => count > 0).length).toBeGreaterThan(10);
    expect(edges).toContain(10);
    expect(counts[counts.length - 1]).toBe(1);
  });
});
