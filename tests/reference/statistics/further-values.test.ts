import { describe, expect, it } from 'vitest';
import {
  assessLimits,
  betaUpperTail,
  binomialProbability,
  binomialUpperTail,
  capability,
  chiSquareUpperTail,
  describeOffsets,
  hypergeometricCdf,
  hypergeometricProbability,
  lotNormalExceedance,
  lotUniformExceedance,
  moments,
  quantile,
  type QuantileType,
  scottWidth,
  shareUpperBound,
  sortedAscending,
  studentTUpperTail,
  twoSidedToleranceFactor,
} from '@shared/statistics';
import samples from '../data/statistics/samples.json';
import { expectWithin } from './cases';

const entry = samples.find(({ what }) => what === 'normal50: moments')!;
const normal50 = Float64Array.from(entry.input.data);
const limits = { low: -8, high: 8 };

describe('figures the collected cases leave out, computed by scipy 1.17 and numpy 2.4 on the same sample', () => {
  // numpy.quantile, methods inverted_cdf ... normal_unbiased
  it.each<[QuantileType, number[]]>([
    [
      'inverse-cdf',
      [-7.506747, -5.048231, -3.738393, -2.637399, -1.473275, 1.056261, 4.068037, 9.042326],
    ],
    [
      'averaged-inverse-cdf',
      [-7.506747, -5.048231, -3.686957, -2.637399, -1.268383, 1.056261, 4.068037, 9.042326],
    ],
    [
      'nearest-even',
      [-7.506747, -5.167216, -3.738393, -2.918929, -1.473275, 1.056261, 4.068037, 9.042326],
    ],
    [
      'linear-inverse-cdf',
      [-7.506747, -5.1077235, -3.738393, -2.778164, -1.473275, 0.9685025, 4.016795, 7.516574],
    ],
    [
      'hazen',
      [-7.506747, -5.048231, -3.686957, -2.637399, -1.268383, 1.056261, 4.068037, 9.042326],
    ],
    [
      'normal-unbiased',
      [
        -7.506747, -5.0616168125, -3.6972442, -2.654994625, -1.268383, 1.0790820625, 4.2843503125,
        9.042326,
      ],
    ],
  ])('quantile type %s', (type, expected) => {
    const sorted = sortedAscending(normal50);
    [0.01, 0.05, 0.1, 0.25, 0.5, 0.75, 0.95, 0.99].forEach((p, i) =>
      expectWithin(quantile(sorted, p, type), expected[i]!, 1e-9),
    );
  });

  it('Scott bin width, (24 sqrt(pi)/n)^(1/3) sd', () => {
    expectWithin(scottWidth(moments(normal50).sd, 50), 2.812942825628123, 1e-12);
  });

  it('lower bounds of Pp (chi2.ppf) and Ppk (root of nct.cdf)', () => {
    const { ppLowerBound, ppkLowerBound } = capability(moments(normal50), limits, 0.95);
    expectWithin(ppLowerBound!, 0.7474963290961195, 1e-11);
    expectWithin(ppkLowerBound, 0.6565392034662058, 1e-9);
  });

  it('upper bound for two limits: roots of nct.cdf at 97.5 % added', () => {
    expectWithin(shareUpperBound(moments(normal50), limits, 0.95), 0.04055245774244408, 1e-9);
  });

  it('links of a measured lot with a normal and a uniform far end', () => {
    const toNormal = lotNormalExceedance(normal50, { mean: 1, sd: 2 }, 4);
    expectWithin(toNormal, 0.3223809925666186, 1e-13);
    expectWithin(lotUniformExceedance(normal50, 10, 4), 0.604549073, 1e-13);
  });

  it('tails of discrete and continuous distributions', () => {
    expectWithin(binomialProbability(60, 1_000_000, 6e-5), 0.051433288011874655, 1e-12);
    expectWithin(binomialProbability(0, 1000, 0.001), 0.3676954247709639, 1e-13);
    expectWithin(binomialUpperTail(70, 1_000_000, 6e-5), 0.09018019023085375, 1e-12);
    expectWithin(hypergeometricProbability(3, 35000, 100, 315), 0.0489285614284737, 1e-11);
    expectWithin(1 - hypergeometricCdf(8, 10000, 65, 200), 5.1911614703949085e-6, 1e-9);
    expectWithin(studentTUpperTail(40, 7), 7.951089992425182e-10, 1e-12);
    expectWithin(chiSquareUpperTail(900, 499), 2.1076947656190427e-25, 1e-12);
    expectWithin(betaUpperTail(0.02, 4, 997), 2.7631676295533944e-6, 1e-12);
  });

  // Odeh and Owen 1980, as printed in ISO 16269-6 (from memory): n = 2, 99 % of units, 95 % confidence.
  it('two-sided tolerance factor of two values', () => {
    expectWithin(twoSidedToleranceFactor(2, 0.99, 0.95), 46.944, 1e-4);
  });

  it('puts the same figures into the assessment of a lot', () => {
    const assessment = assessLimits(describeOffsets(normal50), limits);
    expect(assessment.observed).toMatchObject({ below: 0, above: 1, count: 1, share: 0.02 });
    // betaincinv(2, 49, 0.95)
    expectWithin(assessment.observed.upperBound, 0.0913983, 1e-5);
    expectWithin(assessment.normal!.upperBound, 0.04055245774244408, 1e-9);
    expect(assessment.trust.method).toBe('observed');
    expect(assessment.trust.reasons).toContain('outliers');
  });
});
