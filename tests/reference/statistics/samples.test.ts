import { describe, expect, it } from 'vitest';
import { capability } from '@shared/statistics/capability';
import { countBeyond, plugInShare, unbiasedShare } from '@shared/statistics/fraction-beyond';
import { freedmanDiaconisWidth } from '@shared/statistics/histogram';
import { moments } from '@shared/statistics/moments';
import { andersonDarling } from '@shared/statistics/normality';
import { grubbs } from '@shared/statistics/outliers';
import { median, quantile, type QuantileType } from '@shared/statistics/quantiles';
import { sortedAscending } from '@shared/statistics/sorted';
import file from '../data/statistics/samples.json';
import { casesOf, expectWithin } from './cases';

interface Sample {
  name: string;
  data: number[];
  low?: number;
  high?: number;
}
type Figures = Record<string, number>;

const values = (sample: Sample) => Float64Array.from(sample.data);
const groups = [
  'moments',
  'quantiles',
  'Anderson-Darling',
  'two-sided Grubbs',
  'bins by',
  'beyond',
];

describe('whole samples against numpy and scipy', () => {
  it('runs every case of the file', () => {
    const run = groups.flatMap((group) => casesOf(file, `: ${group}`));
    expect(run.map(({ id }) => id).sort()).toEqual(file.map(({ id }) => id).sort());
    expect(file).toHaveLength(24);
  });

  it.each(casesOf<Sample, Figures>(file, ': moments'))('$id $what', (entry) => {
    const data = values(entry.input);
    const result = moments(data);
    expect(result.n).toBe(entry.expected.n);
    expectWithin(result.mean, entry.expected.mean!, entry.tolerance_rel);
    expectWithin(result.sd, entry.expected.sd!, entry.tolerance_rel);
    expectWithin(median(sortedAscending(data)), entry.expected.median!, entry.tolerance_rel);
    expectWithin(result.skewness!, entry.expected.skewness!, entry.tolerance_rel);
    expectWithin(result.excessKurtosis!, entry.expected.excess_kurtosis!, entry.tolerance_rel);
  });

  it.each(casesOf<Sample, Record<string, number[]>>(file, ': quantiles'))('$id $what', (entry) => {
    const sorted = sortedAscending(values(entry.input));
    const types: Record<string, QuantileType> = {
      weibull: 'weibull',
      linear: 'linear',
      median_unbiased: 'median-unbiased',
    };
    expect(Object.keys(entry.expected)).toEqual(Object.keys(types));
    for (const [name, expected] of Object.entries(entry.expected)) {
      [0.01, 0.05, 0.25, 0.75, 0.95, 0.99].forEach((p, i) =>
        expectWithin(quantile(sorted, p, types[name]), expected[i]!, entry.tolerance_rel),
      );
    }
  });

  it.each(casesOf<Sample, Figures>(file, ': Anderson-Darling'))('$id $what', (entry) => {
    const sorted = sortedAscending(values(entry.input));
    const { mean, sd } = moments(sorted);
    const test = andersonDarling(sorted, mean, sd);
    expectWithin(test.a2, entry.expected.a2!, entry.tolerance_rel);
    expectWithin(test.a2Adjusted, entry.expected.a2_adjusted!, entry.tolerance_rel);
    expectWithin(test.p, entry.expected.p!, entry.tolerance_rel);
  });

  it.each(
    casesOf<Sample, { g: number; critical: number; outlier: boolean }>(file, ': two-sided Grubbs'),
  )('$id $what', (entry) => {
    const test = grubbs(values(entry.input), 0.05);
    expectWithin(test.g, entry.expected.g, entry.tolerance_rel);
    expectWithin(test.critical, entry.expected.critical, entry.tolerance_rel);
    expect(test.outlier).toBe(entry.expected.outlier);
  });

  it.each(casesOf<Sample, Figures>(file, ': bins by Freedman-Diaconis'))('$id $what', (entry) => {
    const width = freedmanDiaconisWidth(sortedAscending(values(entry.input)));
    expectWithin(width, entry.expected.width_rule!, entry.tolerance_rel);
  });

  it.each(casesOf<Sample, Figures>(file, ': beyond'))('$id $what', (entry) => {
    const data = values(entry.input);
    const limits = { low: entry.input.low!, high: entry.input.high! };
    const summary = moments(data);
    expect(countBeyond(sortedAscending(data), limits).count).toBe(entry.expected.observed);
    expectWithin(plugInShare(summary, limits), entry.expected.plug_in!, entry.tolerance_rel);
    expectWithin(unbiasedShare(summary, limits), entry.expected.mvue!, entry.tolerance_rel);
    const { pp, ppk } = capability(summary, limits);
    expectWithin(pp!, entry.expected.pp!, entry.tolerance_rel);
    expectWithin(ppk, entry.expected.ppk!, entry.tolerance_rel);
  });
});
