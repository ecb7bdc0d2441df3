import { describe, expect, it } from 'vitest';
import fc from 'fast-check';
import { lotFinding, type LotFindingInput } from '@shared/decision/lot-finding';
import { type DecisionRule } from '@shared/decision/rule';
import { planFor } from '@shared/sampling/plan';
import { type SamplingRule } from '@shared/sampling/rule';

const plain = (text: string) => text.replaceAll('\u00a0', ' ');
const attribute: SamplingRule = { kind: 'attribute', level: 'II', aqlPercent: 0.25 };

/** A lot like the one in the target picture, with invented figures: 3 of 200 beyond, links well inside. */
const target: LotFindingInput = {
  units: { measured: 200, lotSize: 3000 },
  limits: { lowPpm: -10, highPpm: 10 },
  beyond: { count: 3, share: 0.015, upperBound: 0.0383 },
  guard: {
    rule: { kind: 'guardedAcceptance', factor: 1 },
    guardBandPpm: 1,
    notProvenInside: 2,
    notProvenOutside: 0,
  },
  plan: planFor(attribute, 3000),
  links: {
    receiverName: 'Meterlink 2.4 GHz',
    shareOutside: 0.0002,
    upperBound: 0.003,
    allowedShare: 0.01,
  },
  normality: { a2: 0.31, p: 0.55 },
  outliers: 3,
  clusterCentresPpm: null,
  bench: {
    name: 'Bench 3',
    expandedUncertaintyPpm: 1,
    calibrationDue: '2027-03-01',
    inCalibration: true,
  },
  refusedRows: 0,
};
const good: LotFindingInput = {
  ...target,
  beyond: { count: 0, share: 0, upperBound: 0.0149 },
  guard: { ...target.guard, notProvenInside: 0 },
  outliers: 0,
};
const findingOf = (change: Partial<LotFindingInput>, base = good) => {
  const { decision, headline, reasons } = lotFinding({ ...base, ...change });
  return {
    decision,
    headline: plain(headline),
    texts: reasons.map(({ text }) => plain(text)),
    against: reasons.filter(({ weight }) => weight === 'against').map(({ text }) => plain(text)),
  };
};

describe('the finding', () => {
  it('reads like the sheet it stands on', () => {
    const { decision, headline, texts } = findingOf({}, target);
    expect(decision).toBe('hold');
    expect(headline).toBe(
      'Hold. The sample has more units beyond the limits than the plan allows, though links would still work.',
    );
    expect(texts).toEqual([
      '3 of 200 units are beyond ±10 ppm; the plan accepts 1 (letter L, AQL 0.25 %).',
      'At most 3.8 % of the lot is beyond, with 95 % confidence; the estimate is 1.5 %.',
      '2 units lie within the guard band of 1.0 ppm: conformity not proven.',
      'Links made with these units stay in the symbol-rate region in all but 0.02 % (bound 0.3 %) of cases; the strictest receiver is Meterlink 2.4 GHz.',
      'The body of the lot is normal (A² 0.31, p 0.55); the three units apart are outliers, not a wide process.',
    ]);
  });

  it('accepts when nothing speaks against', () => {
    const { decision, headline, texts } = findingOf({});
    expect(decision).toBe('accept');
    expect(headline).toBe('Accept. The sample meets the plan, and links would work.');
    expect(texts).toContain(
      'None of 200 units is beyond ±10 ppm; the plan accepts 1 (letter L, AQL 0.25 %).',
    );
    expect(texts).toContain(
      'At most 1.5 % of the lot is beyond, with 95 % confidence; none was found.',
    );
    expect(texts).toContain('The lot agrees with a normal distribution (A² 0.31, p 0.55).');
  });

  it('says so when no receiver was judged', () => {
    expect(findingOf({ links: null }).headline).toBe(
      'Accept. The sample meets the plan; no receiver is named for this part.',
    );
  });

  it('holds for links alone, and tells too many from not shown', () => {
    const bad = findingOf({ links: { ...target.links!, shareOutside: 0.021, upperBound: 0.039 } });
    expect(bad.headline).toBe(
      'Hold. The sample meets the plan, but too many links would leave the symbol-rate region.',
    );
    expect(bad.against).toEqual([
      'Links with Meterlink 2.4 GHz leave the symbol-rate region in 2.1 % (bound 3.9 %) of cases; 1 % is allowed.',
    ]);
    const unsure = findingOf({
      links: { ...target.links!, shareOutside: 0.005, upperBound: 0.01004 },
    });
    expect(unsure.headline).toBe(
      'Hold. The sample meets the plan, but does not show that links would work.',
    );
    expect(unsure.against).toEqual([
      'Links with Meterlink 2.4 GHz leave the symbol-rate region in 0.5 % of cases, but up to 1.004 % cannot be ruled out; 1 % is allowed.',
    ]);
  });

  it('holds while units are owed', () => {
    const { headline, against } = findingOf({ units: { measured: 80, lotSize: 3000 } });
    expect(headline).toBe('Hold. 120 of the 200 units owed are still to be measured.');
    expect(against).toEqual(['80 of the 200 units owed have been measured; 120 are missing.']);
    expect(
      findingOf({
        units: { measured: 0, lotSize: 3000 },
        beyond: { count: 0, share: 0, upperBound: 1 },
        normality: null,
      }).headline,
    ).toBe('Hold. No unit has been measured yet.');
  });

  it('holds when the units not proven, by guarded acceptance, exceed the plan', () => {
    const change = {
      beyond: { count: 1, share: 0.005, upperBound: 0.0235 },
      guard: { ...target.guard, notProvenInside: 3 },
    };
    const { headline, against } = findingOf(change);
    expect(headline).toBe(
      'Hold. Too many units are not proven to conform, though links would still work.',
    );
    expect(against).toEqual([
      '3 units lie within the guard band of 1.0 ppm: conformity not proven. With the units beyond, the decision rule refuses 4 of 200; the plan accepts 1.',
    ]);
    // Simple acceptance does not refuse them, and guarded rejection does not even refuse the one beyond.
    expect(
      findingOf({ ...change, guard: { ...change.guard, rule: { kind: 'simple' } } }).decision,
    ).toBe('accept');
  });

  it('counts by guarded rejection only what is proven', () => {
    const guard = {
      rule: { kind: 'guardedRejection', factor: 1 } as DecisionRule,
      guardBandPpm: 1,
      notProvenInside: 0,
      notProvenOutside: 2,
    };
    const { decision, texts } = findingOf({
      guard,
      beyond: { count: 3, share: 0.015, upperBound: 0.0383 },
    });
    expect(decision).toBe('accept');
    expect(texts[0]).toBe(
      '1 of 200 units is proven to be beyond ±10 ppm; the plan accepts 1 (letter L, AQL 0.25 %).',
    );
    expect(texts).toContain(
      'Two units measured beyond the limits are so by no more than the guard band of 1.0 ppm: nonconformity not proven, so not counted.',
    );
  });

  it('carries the plan to more units than it asked for', () => {
    const many = {
      units: { measured: 3000, lotSize: 3000 },
      beyond: { count: 3, share: 0.001, upperBound: 0.0026 },
    };
    const { decision, texts, headline } = findingOf(many);
    expect(decision).toBe('accept');
    expect(texts[0]).toMatch(
      /^3 of 3,000 units are beyond ±10 ppm; the plan, carried from 200 to 3,000 units, accepts \d+ \(letter L, AQL 0\.25 %\)\.$/,
    );
    expect(texts).toContain('Every unit was measured: 0.1 % of the lot is beyond.');
    expect(headline).toBe('Accept. The lot meets the plan, and links would work.');
    expect(
      findingOf({ ...many, beyond: { count: 40, share: 0.0133, upperBound: 0.017 } }).decision,
    ).toBe('hold');
  });

  it('says that reduced inspection ends between its two numbers', () => {
    const plan = planFor(attribute, 3000, 'reduced');
    const { decision, texts } = findingOf({
      plan,
      units: { measured: 80, lotSize: 3000 },
      beyond: { count: 1, share: 0.0125, upperBound: 0.058 },
      inspectionState: 'reduced',
    });
    expect(decision).toBe('accept');
    expect(texts.join(' ')).toContain('the lot passes, and normal inspection returns');
  });

  it('judges a plan by variables by mean and spread, and only of one normal lot', () => {
    const plan = planFor({ kind: 'variables', level: 'II', aqlPercent: 1 }, 3000);
    const units = { measured: 50, lotSize: 3000 };
    const met = { qualityIndex: 2.4, estimatedShare: 0.006, largestShare: 0.026, met: true };
    expect(findingOf({ plan, units, variables: met }).decision).toBe('accept');
    const near = findingOf({ plan, units, variables: { ...met, qualityIndex: 1.52, met: false } });
    expect(near.headline).toBe(
      'Hold. The sample lies closer to its limits than the plan allows, though links would still work.',
    );
    expect(near.against).toEqual([
      'The nearer limit lies 1.52 standard deviations from the mean; the plan asks for at least 1.91 (variables, letter K, AQL 1 %).',
    ]);
    const both = findingOf({
      plan,
      units,
      variables: { qualityIndex: 1.95, estimatedShare: 0.045, largestShare: 0.026, met: false },
    });
    expect(both.against).toEqual([
      'Both limits together leave an estimated 4.5 % beyond; the plan allows 2.6 %.',
    ]);
    const skewed = findingOf({ plan, units, variables: met, normality: { a2: 4.1, p: 1e-7 } });
    expect(skewed.headline).toBe(
      'Hold. The sample meets the plan, but the lot is not the single normal lot that the plan presumes.',
    );
    expect(skewed.against[0]).toContain('p below 0.001');
    const mixed = findingOf({ plan, units, variables: met, clusterCentresPpm: [-2.1, 4.4] });
    expect(mixed.against).toEqual([
      'The offsets gather round \u22122.1 ppm and +4.4 ppm; the lot may mix blanks or production runs, and the plan by variables presumes one normal lot.',
    ]);
    expect(findingOf({ clusterCentresPpm: [-2.1, 4.4] }).decision).toBe('accept');
  });

  it('holds on a bench that cannot carry the decision', () => {
    const overdue = { ...good.bench!, inCalibration: false, calibrationDue: '2026-03-02' };
    expect(findingOf({ bench: overdue }).against).toEqual([
      'The calibration of Bench 3 was due on 2 Mar 2026; the readings were taken out of calibration.',
    ]);
    expect(findingOf({ bench: overdue }).headline).toBe(
      'Hold. The sample meets the plan, but the bench does not carry the decision.',
    );
    expect(findingOf({ bench: { ...overdue, calibrationRequired: false } }).decision).toBe(
      'accept',
    );
    expect(findingOf({ bench: null }).decision).toBe('hold');
    const coarse = { ...good.bench!, expandedUncertaintyPpm: 4 };
    const simple = { ...good.guard, rule: { kind: 'simple' } as DecisionRule, guardBandPpm: 0 };
    expect(findingOf({ bench: coarse, guard: simple }).against[0]).toContain(
      'too large for simple acceptance within ±10 ppm: the ratio is 2.5',
    );
    expect(findingOf({ bench: coarse }).decision).toBe('accept');
    expect(
      findingOf({
        bench: { ...coarse, expandedUncertaintyPpm: 12 },
        guard: { ...good.guard, guardBandPpm: 12 },
      }).against[0],
    ).toContain('no unit can be shown to conform');
    expect(
      findingOf({ bench: { ...coarse, expandedUncertaintyPpm: 2.5 }, guard: simple }).decision,
    ).toBe('accept');
  });

  it('holds while acceptance is discontinued, and mentions refused rows', () => {
    expect(findingOf({ inspectionState: 'discontinued' }).headline).toBe(
      'Hold. Acceptance of this part from this supplier is discontinued.',
    );
    expect(findingOf({ refusedRows: 12 }).texts).toContain(
      '12 rows of the readings were refused and are not judged here.',
    );
    expect(findingOf({ refusedRows: 12 }).decision).toBe('accept');
  });

  it('says every reason to hold, not only the first', () => {
    const { against } = findingOf({
      units: { measured: 150, lotSize: 3000 },
      beyond: { count: 4, share: 4 / 150, upperBound: 0.06 },
      links: { ...target.links!, shareOutside: 0.03, upperBound: 0.06 },
      bench: { ...good.bench!, inCalibration: false },
      inspectionState: 'discontinued',
    });
    expect(against).toHaveLength(5);
  });

  it('refuses numbers that cannot belong to one lot', () => {
    expect(() => findingOf({ beyond: { count: 201, share: 1, upperBound: 1 } })).toThrow(
      /beyond\.count/,
    );
    expect(() => findingOf({ guard: { ...good.guard, notProvenOutside: 1 } })).toThrow(
      /notProvenOutside/,
    );
    expect(() => findingOf({ links: { ...target.links!, upperBound: 1.2 } })).toThrow(
      /links\.upperBound/,
    );
    expect(() =>
      findingOf({ plan: planFor({ kind: 'variables', level: 'II', aqlPercent: 1 }, 3000) }),
    ).toThrow(/variables/);
  });
});

describe('for any lot', () => {
  const share = fc.double({ min: 0, max: 1, noNaN: true });
  const rule: fc.Arbitrary<SamplingRule> = fc.oneof(
    fc.record({
      kind: fc.constant('attribute' as const),
      level: fc.constantFrom('I' as const, 'II' as const, 'S-3' as const),
      aqlPercent: fc.constantFrom(0.1, 0.25, 1, 6.5),
    }),
    fc.record({
      kind: fc.constant('zeroAcceptance' as const),
      limitingQualityPercent: fc.constantFrom(1, 5),
      consumersRisk: fc.constant(0.1),
    }),
    fc.record({
      kind: fc.constant('variables' as const),
      level: fc.constant('II' as const),
      aqlPercent: fc.constantFrom(0.25, 1),
    }),
    fc.record({
      kind: fc.constant('everyUnit' as const),
      allowedNonconforming: fc.integer({ min: 0, max: 2 }),
    }),
  );
  const decisionRule: fc.Arbitrary<DecisionRule> = fc.oneof(
    fc.constant({ kind: 'simple' } as const),
    fc.record({
      kind: fc.constantFrom('guardedAcceptance' as const, 'guardedRejection' as const),
      factor: fc.constant(1),
    }),
  );
  const few = fc.oneof(
    { weight: 3, arbitrary: fc.constant(0) },
    { weight: 2, arbitrary: fc.integer({ min: 0, max: 6 }) },
  );
  const anyInput: fc.Arbitrary<LotFindingInput> = fc
    .record({
      lotSize: fc.integer({ min: 10, max: 5000 }),
      part: fc.oneof(fc.constant(1), share),
      rule,
      decisionRule,
      beyond: few,
      inside: few,
      outside: few,
      width: fc.constantFrom(0, 1, 12),
      severity: fc.constantFrom('normal' as const, 'tightened' as const, 'reduced' as const),
      links: fc.option(
        fc.record({
          receiverName: fc.constant('Receiver'),
          shareOutside: fc.oneof(fc.constant(0), share),
          upperBound: fc.oneof(fc.constant(0.001), share),
          allowedShare: fc.oneof(fc.constant(0.01), share),
        }),
      ),
      normality: fc.option(fc.record({ a2: fc.double({ min: 0, max: 9, noNaN: true }), p: share })),
      outliers: few,
      refusedRows: few,
      bench: fc.option(
        fc.record({
          name: fc.constant('Bench'),
          expandedUncertaintyPpm: fc.constantFrom(0.1, 1, 12),
          calibrationDue: fc.constant('2026-03-02'),
          inCalibration: fc.boolean(),
        }),
        { freq: 9 },
      ),
      variables: fc.record({
        qualityIndex: fc.double({ min: 0, max: 5, noNaN: true }),
        estimatedShare: share,
        largestShare: share,
        met: fc.boolean(),
      }),
      inspectionState: fc.constantFrom(
        'normal' as const,
        'normal' as const,
        'tightened' as const,
        'reduced' as const,
        'discontinued' as const,
      ),
      clusterCentresPpm: fc.constantFrom(null, [], [-1, 2]),
    })
    .map(
      ({
        lotSize,
        part,
        rule: sampling,
        decisionRule: decision,
        beyond,
        inside,
        outside,
        width,
        severity,
        ...rest
      }) => {
        const plan = planFor(sampling, lotSize, severity);
        const measured = Math.min(lotSize, Math.max(0, Math.round(plan.sampleSize * part * 1.2)));
        const found = Math.min(beyond, measured);
        return {
          ...rest,
          plan,
          units: { measured, lotSize },
          limits: { lowPpm: -10, highPpm: 10 },
          beyond: { count: found, share: measured === 0 ? 0 : found / measured, upperBound: 1 },
          guard: {
            rule: decision,
            guardBandPpm: decision.kind === 'simple' ? 0 : width,
            notProvenInside: Math.min(inside, measured - found),
            notProvenOutside: Math.min(outside, found),
          },
        };
      },
    );

  it('accepts exactly when no reason stands against, and speaks in whole sentences', () => {
    let accepted = 0;
    fc.assert(
      fc.property(anyInput, (input) => {
        const { decision, headline, reasons } = lotFinding(input);
        const against = reasons.filter(({ weight }) => weight === 'against');
        expect(decision).toBe(against.length === 0 ? 'accept' : 'hold');
        expect(headline).toMatch(
          decision === 'accept' ? /^Accept\. [A-Z].*\.$/ : /^Hold\. [A-Z\d].*\.$/,
        );
        expect(reasons.length).toBeGreaterThan(0);
        for (const { text } of reasons) expect(text).toMatch(/^[A-Z\d][^\n]*[^. ]\.$/);
        expect(
          reasons
            .map(({ weight }) => weight === 'against')
            .sort()
            .reverse(),
        ).toEqual(reasons.map(({ weight }) => weight === 'against'));
        expect(`${headline}${reasons.map(({ text }) => text).join('')}`).not.toMatch(
          /undefined|NaN|null|\u2013/,
        );
        if (decision === 'accept') accepted += 1;
      }),
      { numRuns: 600 },
    );
    expect(accepted).toBeGreaterThan(5);
  });

  it('never accepts with units missing, the plan missed, or the bound of the links above what is allowed', () => {
    fc.assert(
      fc.property(anyInput, (input) => {
        if (lotFinding(input).decision === 'hold') return;
        expect(input.units.measured).toBeGreaterThanOrEqual(input.plan.sampleSize);
        if (input.links)
          expect(input.links.upperBound).toBeLessThanOrEqual(input.links.allowedShare);
        if (input.plan.kind === 'variables') expect(input.variables!.met).toBe(true);
        else if (
          input.units.measured === input.plan.sampleSize &&
          input.guard.rule.kind !== 'guardedRejection'
        )
          expect(input.beyond.count).toBeLessThan(input.plan.rejectionNumber);
        expect(input.inspectionState).not.toBe('discontinued');
      }),
      { numRuns: 600 },
    );
  });
});
