import { describe, expect, it } from 'vitest';
import {
  andersonDarling,
  assessLimits,
  betaCdf,
  betaQuantile,
  binomialCdf,
  capability,
  chartConstants,
  chiSquareQuantile,
  clopperPearson,
  countBeyond,
  describeOffsets,
  generalisedEsd,
  grubbs,
  histogram,
  hypergeometricCdf,
  lag1Autocorrelation,
  lotPairExceedance,
  lotUniformExceedance,
  moments,
  noncentralTCdf,
  normalPairExceedance,
  normalQuantile,
  oneSidedToleranceFactor,
  plugInShare,
  quantile,
  shareUpperBound,
  sortedAscending,
  StatisticsError,
  type StatisticsErrorCode,
  studentTCdf,
  toleranceInterval,
  trustworthyMethod,
  twoClusters,
  unbiasedShare,
} from '@shared/statistics';

const of = (...values: number[]) => Float64Array.from(values);
const sample = { n: 10, mean: 0, sd: 1 };
const flat = { n: 10, mean: 0, sd: 0 };
const limits = { low: -1, high: 1 };
const crossed = { low: 1, high: -1 };
const none = { low: null, high: null };
const ten = of(1, 2, 3, 4, 5, 6, 7, 8, 9, 10);

describe('bad input is refused by name', () => {
  it.each<[string, StatisticsErrorCode, string, () => unknown]>([
    ['one value has no spread', 'too_few_values', 'values', () => moments(of(1))],
    ['a NaN among readings', 'not_finite', 'values', () => moments(of(1, NaN, 3))],
    ['an infinite reading', 'not_finite', 'values', () => sortedAscending(of(1, -Infinity))],
    ['no readings at all', 'too_few_values', 'offsetsPpm', () => describeOffsets(of())],
    ['equal readings: correlation', 'zero_spread', 'values', () => lag1Autocorrelation(of(2, 2))],
    ['equal readings: normality', 'zero_spread', 'sd', () => andersonDarling(ten, 1, 0)],
    [
      'seven readings: normality',
      'too_few_values',
      'sorted',
      () => andersonDarling(ten.slice(3), 1, 1),
    ],
    ['equal readings: Grubbs', 'zero_spread', 'values', () => grubbs(of(3, 3, 3))],
    ['two readings: Grubbs', 'too_few_values', 'values', () => grubbs(of(3, 4))],
    ['alpha of one', 'out_of_range', 'alpha', () => grubbs(ten, 1)],
    ['more outliers than readings', 'too_few_values', 'sorted', () => generalisedEsd(ten, 8)],
    ['half an outlier', 'not_whole', 'maxOutliers', () => generalisedEsd(ten, 0.5)],
    ['nine readings: clusters', 'too_few_values', 'sorted', () => twoClusters(ten.slice(1))],
    ['share above one', 'out_of_range', 'p', () => quantile(ten, 1.1)],
    ['quantile of nothing', 'too_few_values', 'sorted', () => quantile(of(), 0.5)],
    [
      'bin width of zero',
      'out_of_range',
      'rule.width',
      () => histogram(ten, { rule: { width: 0 } }),
    ],
    [
      'crossed limits: histogram',
      'limits_crossed',
      'limits',
      () => histogram(ten, { limits: [crossed] }),
    ],
    ['crossed limits: count', 'limits_crossed', 'limits', () => countBeyond(ten, crossed)],
    ['crossed limits: estimate', 'limits_crossed', 'limits', () => unbiasedShare(sample, crossed)],
    ['crossed limits: bound', 'limits_crossed', 'limits', () => shareUpperBound(sample, crossed)],
    [
      'equal limits: capability',
      'limits_crossed',
      'limits',
      () => capability(sample, { low: 1, high: 1 }),
    ],
    ['no limit at all', 'limits_missing', 'limits', () => plugInShare(sample, none)],
    [
      'infinite limit',
      'not_finite',
      'limits.high',
      () => countBeyond(ten, { low: null, high: Infinity }),
    ],
    ['equal readings: estimate', 'zero_spread', 'summary.sd', () => plugInShare(flat, limits)],
    ['equal readings: capability', 'zero_spread', 'summary.sd', () => capability(flat, limits)],
    [
      'two readings: unbiased estimate',
      'out_of_range',
      'summary.n',
      () => unbiasedShare({ ...sample, n: 2 }, limits),
    ],
    [
      'confidence of one',
      'out_of_range',
      'confidence',
      () => assessLimits(describeOffsets(ten), limits, 1),
    ],
    ['more found than measured', 'out_of_range', 'found', () => clopperPearson(3, 2)],
    ['half a unit found', 'not_whole', 'found', () => clopperPearson(0.5, 2)],
    [
      'no units',
      'out_of_range',
      'n',
      () => trustworthyMethod({ n: 0, found: 0, normality: null, outliers: null, clusters: null }),
    ],
    [
      'tolerance factor of one value',
      'out_of_range',
      'n',
      () => oneSidedToleranceFactor(1, 0.9, 0.95),
    ],
    [
      'tolerance interval without spread',
      'zero_spread',
      'summary.sd',
      () => toleranceInterval(flat, 0.9, 0.95),
    ],
    ['subgroup of one', 'out_of_range', 'n', () => chartConstants(1)],
    ['quantile at zero', 'out_of_range', 'p', () => normalQuantile(0)],
    ['no degrees of freedom', 'out_of_range', 'degrees', () => studentTCdf(1, 0)],
    ['half a degree of freedom', 'out_of_range', 'degrees', () => noncentralTCdf(1, 0.5, 1)],
    ['quantile at one', 'out_of_range', 'p', () => chiSquareQuantile(1, 5)],
    ['shape of zero', 'out_of_range', 'a', () => betaCdf(0.5, 0, 1)],
    ['probability above one', 'out_of_range', 'p', () => betaQuantile(1.5, 2, 1)],
    ['share below zero', 'out_of_range', 'p', () => binomialCdf(1, 3, -0.1)],
    [
      'sample larger than the lot',
      'out_of_range',
      'sampleSize',
      () => hypergeometricCdf(0, 10, 2, 11),
    ],
    ['negative limit of a link', 'out_of_range', 'limit', () => lotPairExceedance(ten, ten, -1)],
    ['far end without width', 'out_of_range', 'halfWidth', () => lotUniformExceedance(ten, 0, 1)],
    [
      'two ends without spread',
      'zero_spread',
      'a.sd',
      () => normalPairExceedance({ mean: 0, sd: 0 }, { mean: 0, sd: 0 }, 1),
    ],
  ])('%s: %s on %s', (_, code, argument, act) => {
    let thrown: unknown;
    try {
      act();
    } catch (error) {
      thrown = error;
    }
    expect(thrown).toBeInstanceOf(StatisticsError);
    expect(thrown).toMatchObject({ code, argument });
    expect((thrown as StatisticsError).message.startsWith(`${argument} `)).toBe(true);
  });
});
