import { describe, expect, it } from 'vitest';
import fc from 'fast-check';
import { CODE_LETTERS, SEVERITIES } from '@shared/sampling/rule';
import { AQL_PERCENTS } from '@shared/sampling/tables/attribute-master';
import { STANDARD_414_SAMPLE_SIZES } from '@shared/sampling/tables/variables-standard';
import { variablesVerdict } from '@shared/sampling/variables-criterion';
import {
  acceptabilityConstant,
  standardK,
  variablesAcceptance,
  variablesPlanForLetter,
} from '@shared/sampling/variables-plan';
import reference from '../data/sampling/variables-k.json';

// Source: MIL-STD-414 (1957), table B-1, s method, normal inspection, form 1, from memory.

const { n: sampleSizes, ...columns } = reference.k;
const cases = Object.entries(columns).flatMap(([aql, byLetter]) =>
  Object.entries(byLetter).map(([letter, k]) => ({
    aql: Number(aql),
    letter,
    k,
    n: (sampleSizes as Record<string, number>)[letter]!,
  })),
);

describe('the constants of MIL-STD-414', () => {
  it('has the sample sizes of the reference', () => {
    expect(STANDARD_414_SAMPLE_SIZES).toEqual(sampleSizes);
    expect(cases).toHaveLength(46);
  });

  it.each(cases)('AQL $aql %, letter $letter, $n units: k $k', ({ aql, letter, k, n }) => {
    expect(standardK(n, aql)).toEqual({ letter, k });
    const acceptance = variablesAcceptance(n, k, aql / 100);
    expect(acceptance).toBeGreaterThan(0.885);
    expect(acceptance).toBeLessThan(0.995);
    // The recomputation returns the table's k, given the table's own risk: both directions of the noncentral t agree.
    expect(acceptabilityConstant(n, aql / 100, acceptance)).toBeCloseTo(k, 9);
  });

  it('accepts a lot at its AQL more often as the sample grows', () => {
    for (const aql of Object.keys(columns).map(Number)) {
      const column = cases.filter((each) => each.aql === aql).sort((a, b) => a.n - b.n);
      const acceptance = column.map(({ n, k }) => variablesAcceptance(n, k, aql / 100));
      acceptance
        .slice(1)
        .forEach((value, index) => expect(value).toBeGreaterThan(acceptance[index]! - 0.002));
    }
  });
});

describe('variables plans recomputed', () => {
  it.each(SEVERITIES)(
    'meet the risk of the attribute plan at every letter and AQL, %s',
    (severity) => {
      for (const letter of CODE_LETTERS.filter((each) => each !== 'S'))
        for (const aql of AQL_PERCENTS) {
          const plan = variablesPlanForLetter(letter, aql, severity);
          const acceptance = variablesAcceptance(plan.sampleSize, plan.k, aql / 100);
          expect(Math.abs(acceptance - plan.matched.acceptanceProbabilityAtAql)).toBeLessThan(1e-9);
          expect(plan.sampleSize).toBeLessThanOrEqual(Math.max(3, plan.matched.sampleSize * 1.5));
        }
    },
  );

  it('lie within 0.21 of the standard where the standard is known, and say by how much', () => {
    const compared = CODE_LETTERS.filter((letter) => letter !== 'S').flatMap((letter) =>
      AQL_PERCENTS.map((aql) => variablesPlanForLetter(letter, aql, 'normal')).filter(
        (plan) => plan.standard !== null,
      ),
    );
    expect(compared.length).toBeGreaterThan(20);
    for (const { k, standard } of compared) {
      expect(standard!.difference).toBeCloseTo(k - standard!.k, 12);
      expect(Math.abs(standard!.difference)).toBeLessThan(0.21);
    }
  });

  // Source: scipy 1.17.1, nct.ppf(1 - Pa, n - 1, sqrt(n) norm.isf(share)) / sqrt(n), Pa by binom.cdf.
  it.each([
    { letter: 'E', aql: 1, n: 7, k: 1.6827889485215104 },
    { letter: 'J', aql: 0.65, n: 35, k: 2.098647740360397 },
    { letter: 'L', aql: 0.25, n: 75, k: 2.498261141088522 },
    { letter: 'H', aql: 4, n: 20, k: 1.1280241876631498 },
    { letter: 'B', aql: 4, n: 3, k: 0.9749105752232132 },
    { letter: 'P', aql: 1, n: 200, k: 2.0608542938663827 },
  ] as const)('letter $letter at AQL $aql %: k $k', ({ letter, aql, n, k }) => {
    const plan = variablesPlanForLetter(letter, aql, 'normal');
    expect(plan.sampleSize).toBe(n);
    expect(plan.k).toBeCloseTo(k, 9);
  });
});

describe('the verdict on a variables sample', () => {
  const limits = { lowPpm: -10, highPpm: 10 };

  it('meets one limit exactly at k', () => {
    const at = variablesVerdict(
      { units: 15, meanPpm: 10 - 2 * 1.79, sdPpm: 2 },
      { lowPpm: null, highPpm: 10 },
      1.79 - 1e-12,
    );
    expect(at).toMatchObject({ met: true, qualityIndexLow: null });
    expect(at.estimatedShare).toBeCloseTo(at.largestShare, 9);
  });

  it('asks both limits together for no more than one limit alone may use', () => {
    // Both limits at Q = k: each side alone would pass, together they have twice the share.
    const verdict = variablesVerdict({ units: 15, meanPpm: 0, sdPpm: 10 / 1.8 }, limits, 1.79);
    expect(verdict.qualityIndex).toBeCloseTo(1.8, 12);
    expect(verdict.met).toBe(false);
    expect(verdict.estimatedShare).toBeGreaterThan(verdict.largestShare);
  });

  it('mirrors', () => {
    fc.assert(
      fc.property(
        fc.double({ min: -9, max: 9, noNaN: true }),
        fc.double({ min: 0.1, max: 8, noNaN: true }),
        fc.integer({ min: 3, max: 200 }),
        (meanPpm, sdPpm, units) => {
          const one = variablesVerdict({ units, meanPpm, sdPpm }, limits, 1.8);
          const other = variablesVerdict({ units, meanPpm: -meanPpm, sdPpm }, limits, 1.8);
          expect(one.estimatedShare).toBeCloseTo(other.estimatedShare, 12);
          expect(one.met).toBe(other.met);
          expect(one.estimatedShare).toBeGreaterThanOrEqual(0);
          expect(one.estimatedShare).toBeLessThanOrEqual(1);
        },
      ),
    );
  });

  it('names bad input', () => {
    expect(() => variablesVerdict({ units: 2, meanPpm: 0, sdPpm: 1 }, limits, 1.8)).toThrow(
      /at least 3/,
    );
    expect(() => variablesVerdict({ units: 9, meanPpm: 0, sdPpm: 0 }, limits, 1.8)).toThrow(
      /spread/,
    );
    expect(() =>
      variablesVerdict({ units: 9, meanPpm: 0, sdPpm: 1 }, { lowPpm: null, highPpm: null }, 1.8),
    ).toThrow(/limit/);
    expect(() =>
      variablesVerdict({ units: 9, meanPpm: 0, sdPpm: 1 }, { lowPpm: 5, highPpm: 5 }, 1.8),
    ).toThrow(/limits/);
  });
});
