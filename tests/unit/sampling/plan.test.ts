import { describe, expect, it } from 'vitest';
import fc from 'fast-check';
import {
  acceptanceProbability,
  operatingCharacteristic,
  shareAccepted,
} from '@shared/sampling/operating-characteristic';
import { planSource } from '@shared/sampling/plan-source';
import { planFor } from '@shared/sampling/plan';
import { INSPECTION_LEVELS, SEVERITIES, type SamplingRule } from '@shared/sampling/rule';
import { AQL_PERCENTS } from '@shared/sampling/tables/attribute-master';
import { widenPlan } from '@shared/sampling/widen-plan';

const plain = (text: string) => text.replaceAll('\u00a0', ' ');

const level = fc.constantFrom(...INSPECTION_LEVELS);
const aqlPercent = fc.constantFrom(...AQL_PERCENTS);
const anyRule: fc.Arbitrary<SamplingRule> = fc.oneof(
  fc.record({ kind: fc.constant('attribute' as const), level, aqlPercent }),
  fc.record({ kind: fc.constant('variables' as const), level, aqlPercent }),
  fc.record({
    kind: fc.constant('zeroAcceptance' as const),
    limitingQualityPercent: fc.constantFrom(0.5, 1, 2, 5, 10),
    consumersRisk: fc.constantFrom(0.05, 0.1),
  }),
  fc.record({
    kind: fc.constant('everyUnit' as const),
    allowedNonconforming: fc.integer({ min: 0, max: 3 }),
  }),
);
const anyPlan = fc
  .tuple(anyRule, fc.integer({ min: 1, max: 600_000 }), fc.constantFrom(...SEVERITIES))
  .map(([rule, lotSize, severity]) => planFor(rule, lotSize, severity));

describe('the plan of a lot', () => {
  it('speaks as the trade does', () => {
    const rule = { kind: 'attribute', level: 'II', aqlPercent: 0.25 } as const;
    const plan = planFor(rule, 8000);
    expect(plan).toMatchObject({
      kind: 'attribute',
      codeLetter: 'L',
      sampleSize: 200,
      acceptanceNumber: 1,
      rejectionNumber: 2,
      everyUnit: false,
    });
    expect(plain(plan.description)).toBe(
      'letter L, AQL 0.25 %, 200 units, accept on 1, reject on 2',
    );
    expect(plain(planFor(rule, 8000, 'reduced').description)).toBe(
      'letter L, AQL 0.25 %, reduced inspection, 80 units, accept on 0, reject on 2',
    );
  });

  it('follows an arrow to another sample size', () => {
    // 3,000 units at level II: letter K, whose cell at 0.25 % points to L.
    const plan = planFor({ kind: 'attribute', level: 'II', aqlPercent: 0.25 }, 3000);
    expect(plan).toMatchObject({ lotCodeLetter: 'K', codeLetter: 'L', sampleSize: 200 });
  });

  it('inspects every unit when the sample reaches the lot', () => {
    const plan = planFor({ kind: 'attribute', level: 'II', aqlPercent: 0.25 }, 40);
    expect(plan).toMatchObject({ sampleSize: 40, everyUnit: true, acceptanceNumber: 0 });
    expect(plain(plan.description)).toContain('all 40 units of the lot');
    expect(planFor({ kind: 'variables', level: 'II', aqlPercent: 0.01 }, 20)).toMatchObject({
      kind: 'everyUnit',
      sampleSize: 20,
    });
    expect(planFor({ kind: 'everyUnit', allowedNonconforming: 2 }, 500)).toMatchObject({
      sampleSize: 500,
      acceptanceNumber: 2,
      rejectionNumber: 3,
    });
    expect(planFor({ kind: 'attribute', level: 'II', aqlPercent: 1 }, 1)).toMatchObject({
      sampleSize: 1,
      everyUnit: true,
    });
  });

  it('gives the variables constant with what it was matched to and what the standard says', () => {
    const plan = planFor({ kind: 'variables', level: 'II', aqlPercent: 1 }, 2000);
    expect(plan).toMatchObject({
      kind: 'variables',
      codeLetter: 'K',
      sampleSize: 50,
      matched: { sampleSize: 125 },
      standard: { letter: 'M', k: 1.93 },
    });
    expect(plain(plan.description)).toMatch(
      /^variables, letter K, AQL 1 %, 50 units, accept when the limits lie at least k = 1\.907 standard deviations from the mean$/,
    );
  });

  it('is plain data: it survives being frozen as JSON', () => {
    fc.assert(
      fc.property(anyPlan, (plan) => {
        expect(JSON.parse(JSON.stringify(plan))).toEqual(plan);
      }),
      { numRuns: 60 },
    );
  });

  it('never asks for more than the lot, nor for nothing', () => {
    fc.assert(
      fc.property(anyPlan, (plan) => {
        expect(plan.sampleSize).toBeGreaterThanOrEqual(1);
        expect(plan.sampleSize).toBeLessThanOrEqual(plan.lotSize);
        expect(plan.everyUnit).toBe(plan.sampleSize === plan.lotSize);
      }),
    );
  });

  it('names what is wrong with a rule', () => {
    expect(() => planFor({ kind: 'attribute', level: 'II', aqlPercent: 0.3 }, 100)).toThrow(
      /aqlPercent must be one of/,
    );
    expect(() => planFor({ kind: 'attribute', level: 'II', aqlPercent: 1 }, 0)).toThrow(/lotSize/);
    expect(() => planFor({ kind: 'everyUnit', allowedNonconforming: -1 }, 10)).toThrow(
      /allowedNonconforming/,
    );
  });
});

describe('the operating characteristic', () => {
  it('falls from one and stays between nought and one', () => {
    fc.assert(
      fc.property(anyPlan, (plan) => {
        const { points } = operatingCharacteristic(plan, 25);
        expect(points[0]).toEqual({ percentNonconforming: 0, acceptanceProbability: 1 });
        points
          .slice(1)
          .forEach(({ percentNonconforming, acceptanceProbability: probability }, index) => {
            const before = points[index]!;
            expect(percentNonconforming).toBeGreaterThan(before.percentNonconforming);
            expect(probability).toBeGreaterThanOrEqual(0);
            expect(probability).toBeLessThanOrEqual(before.acceptanceProbability + 1e-12);
          });
      }),
      { numRuns: 60 },
    );
  });

  it('finds the share for a probability again', () => {
    fc.assert(
      fc.property(
        anyPlan,
        fc.double({ min: 0.02, max: 0.98, noNaN: true }),
        (plan, probability) => {
          const share = shareAccepted(plan, probability);
          if (share < 1)
            expect(acceptanceProbability(plan, Math.max(0, share - 1e-9))).toBeGreaterThanOrEqual(
              probability - 1e-6,
            );
          expect(acceptanceProbability(plan, Math.min(1, share + 1e-9))).toBeLessThan(
            share < 1 ? probability + 1e-6 : 1.000001,
          );
        },
      ),
      { numRuns: 60 },
    );
  });

  it('stands at the published points of letter L, AQL 0.25 %', () => {
    // 200 units, accept on 1: (1-p)^200 + 200 p (1-p)^199, by hand at p = 1 %.
    const plan = planFor({ kind: 'attribute', level: 'II', aqlPercent: 0.25 }, 8000);
    expect(acceptanceProbability(plan, 0.01)).toBeCloseTo(
      0.99 ** 200 + 200 * 0.01 * 0.99 ** 199,
      12,
    );
    const curve = operatingCharacteristic(plan);
    expect(curve.method).toBe('binomial');
    expect(curve.producersPercent).toBeLessThan(curve.indifferencePercent);
    expect(curve.indifferencePercent).toBeLessThan(curve.consumersPercent);
  });

  it('knows the lot when the sample empties it', () => {
    const plan = planFor(
      { kind: 'zeroAcceptance', limitingQualityPercent: 2, consumersRisk: 0.1 },
      50,
    );
    // 45 of 50 units; one bad unit is missed with 5/50, two with 5*4/(50*49).
    expect(acceptanceProbability(plan, 1 / 50)).toBeCloseTo(0.1, 12);
    expect(acceptanceProbability(plan, 2 / 50)).toBeCloseTo(20 / 2450, 12);
    expect(acceptanceProbability(plan, 1.5 / 50)).toBeCloseTo((0.1 + 20 / 2450) / 2, 12);
  });
});

describe('measuring more units than the plan asked for', () => {
  const plan = planFor({ kind: 'attribute', level: 'II', aqlPercent: 0.25 }, 8000);

  it('leaves the plan alone up to its sample', () => {
    expect(widenPlan(plan, 200)).toBe(plan);
    expect(widenPlan(plan, 80)).toBe(plan);
    const zero = planFor(
      { kind: 'zeroAcceptance', limitingQualityPercent: 2, consumersRisk: 0.1 },
      500,
    );
    expect(widenPlan(zero, 500)).toBe(zero);
  });

  it('keeps the producer’s risk at the AQL and lowers the consumer’s', () => {
    fc.assert(
      fc.property(fc.integer({ min: 201, max: 8000 }), (units) => {
        const wide = widenPlan(plan, units);
        if (wide.kind !== 'attribute') throw new Error('kind changed');
        expect(wide.rejectionNumber).toBe(wide.acceptanceNumber + 1);
        expect(wide.sampleSize).toBe(units);
        expect(wide.acceptanceNumber / units).toBeLessThan(0.0101);
      }),
      { numRuns: 40 },
    );
    const wide = widenPlan(plan, 2000);
    const atAql = (each: typeof plan) => acceptanceProbability({ ...each, lotSize: 1e7 }, 0.0025);
    expect(atAql(wide)).toBeGreaterThanOrEqual(atAql(plan));
    expect(shareAccepted(wide, 0.1)).toBeLessThan(shareAccepted(plan, 0.1));
  });
});

describe('the source of a plan', () => {
  it('says what comes from a standard and what is recomputed', () => {
    const attribute = planFor({ kind: 'attribute', level: 'II', aqlPercent: 0.25 }, 8000);
    expect(planSource(attribute)).toContain('MIL-STD-105E (1989)');
    expect(planSource(attribute)).not.toContain('our own');
    expect(planSource(widenPlan(attribute, 1000))).toContain('our own');
    const known = planFor({ kind: 'variables', level: 'II', aqlPercent: 1 }, 2000);
    expect(plain(planSource(known))).toContain('with 125 units by attributes (96.3 %)');
    expect(planSource(known)).toContain('gives 1.93; the difference is \u22120.023');
    const unknown = planFor({ kind: 'variables', level: 'II', aqlPercent: 0.25 }, 2000);
    expect(planSource(unknown)).toContain('not on record here');
    expect(planSource(planFor({ kind: 'everyUnit', allowedNonconforming: 0 }, 10))).toContain(
      'nothing is estimated',
    );
    const zero = planFor(
      { kind: 'zeroAcceptance', limitingQualityPercent: 1, consumersRisk: 0.1 },
      500,
    );
    expect(planSource(zero)).toContain('hypergeometric');
    expect(plain(zero.description)).toBe(
      'zero acceptance, limiting quality 1 % at 10 % consumer’s risk, 184 units, accept on 0, reject on 1',
    );
  });
});
