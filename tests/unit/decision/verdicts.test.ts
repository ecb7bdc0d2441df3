import { describe, expect, it } from 'vitest';
import fc from 'fast-check';
import { acceptanceLimits, guardBandPpm } from '@shared/decision/guard-band';
import { globalRisk } from '@shared/decision/global-risk';
import { lotMeanUncertainty } from '@shared/decision/lot-mean-uncertainty';
import { counterUncertainty } from '@shared/decision/counter-uncertainty';
import { type DecisionRule, isBeyond } from '@shared/decision/rule';
import { conformingProbability } from '@shared/decision/specific-risk';
import { countVerdicts, unitVerdict } from '@shared/decision/unit-verdict';

const limits = { lowPpm: -10, highPpm: 10 };
const simple: DecisionRule = { kind: 'simple' };
const guarded: DecisionRule = { kind: 'guardedAcceptance', factor: 1 };
const relaxed: DecisionRule = { kind: 'guardedRejection', factor: 1 };
const anyRule: fc.Arbitrary<DecisionRule> = fc.oneof(
  fc.constant(simple),
  fc.record({
    kind: fc.constantFrom('guardedAcceptance' as const, 'guardedRejection' as const),
    factor: fc.double({ min: 0, max: 3, noNaN: true }),
  }),
);
const anyOffset = fc.double({ min: -30, max: 30, noNaN: true });
const anyUncertainty = fc.double({ min: 0, max: 5, noNaN: true });

describe('the verdict on a unit', () => {
  it.each([
    [8.9, 'conforming'],
    [9, 'conforming'],
    [9.01, 'notProven'],
    [10, 'notProven'],
    [10.5, 'notProven'],
    [11, 'notProven'],
    [11.01, 'nonconforming'],
    [-11.01, 'nonconforming'],
    [-9, 'conforming'],
  ] as const)('%d ppm with U = 1 ppm is %s', (offset, outcome) => {
    expect(unitVerdict(offset, limits, guarded, 1).outcome).toBe(outcome);
    expect(unitVerdict(offset, limits, relaxed, 1).outcome).toBe(outcome);
  });

  it('takes by rule', () => {
    const accepted = (offset: number, rule: DecisionRule) =>
      unitVerdict(offset, limits, rule, 1).accepted;
    expect([simple, guarded, relaxed].map((rule) => accepted(9.5, rule))).toEqual([
      true,
      false,
      true,
    ]);
    expect([simple, guarded, relaxed].map((rule) => accepted(10.5, rule))).toEqual([
      false,
      false,
      true,
    ]);
    expect([simple, guarded, relaxed].map((rule) => accepted(11.5, rule))).toEqual([
      false,
      false,
      false,
    ]);
  });

  it('puts a value on a limit inside, also when a division has rounded it', () => {
    expect(unitVerdict(10, limits, simple, 1)).toEqual({
      outcome: 'conforming',
      beyond: false,
      accepted: true,
    });
    expect(isBeyond((0.3 / 3) * 100 + 1e-14, limits)).toBe(false);
    // 0.3 - 0.1 is 0.19999999999999998 in binary; 0.2 is still on the edge of the guard band.
    expect(unitVerdict(0.2, { lowPpm: -0.3, highPpm: 0.3 }, guarded, 0.1).outcome).toBe(
      'conforming',
    );
    expect(isBeyond(10 + 1e-8, limits)).toBe(true);
  });

  it('reads one limit alone', () => {
    const upper = { lowPpm: null, highPpm: 10 };
    expect(unitVerdict(-500, upper, guarded, 1).outcome).toBe('conforming');
    expect(unitVerdict(12, upper, guarded, 1).outcome).toBe('nonconforming');
  });

  it('knows two outcomes only where there is no guard band', () => {
    fc.assert(
      fc.property(anyOffset, anyUncertainty, (offset, u) => {
        expect(unitVerdict(offset, limits, simple, u).outcome).not.toBe('notProven');
      }),
    );
  });

  it('is the same on both sides', () => {
    fc.assert(
      fc.property(anyOffset, anyRule, anyUncertainty, (offset, rule, u) => {
        expect(unitVerdict(offset, limits, rule, u)).toEqual(unitVerdict(-offset, limits, rule, u));
      }),
    );
  });

  it('draws guard bands symmetrically, and lets nobody through whom a looser rule refuses', () => {
    fc.assert(
      fc.property(anyOffset, anyRule, anyUncertainty, (offset, rule, u) => {
        const { lowPpm, highPpm, guardBandPpm: width } = acceptanceLimits(limits, rule, u);
        expect(lowPpm! + highPpm!).toBeCloseTo(0, 12);
        expect(width).toBe(guardBandPpm(rule, u));
        const tight = unitVerdict(offset, limits, guarded, u).accepted;
        const plain = unitVerdict(offset, limits, simple, u).accepted;
        const loose = unitVerdict(offset, limits, relaxed, u).accepted;
        expect([tight, plain, loose]).toEqual([tight, plain, loose].sort());
      }),
    );
  });

  it('counts every unit once', () => {
    fc.assert(
      fc.property(
        fc.array(anyOffset, { maxLength: 60 }),
        anyRule,
        anyUncertainty,
        (offsets, rule, u) => {
          const counts = countVerdicts(Float64Array.from(offsets), limits, rule, u);
          const verdicts = offsets.map((offset) => unitVerdict(offset, limits, rule, u));
          const having = (outcome: string) =>
            verdicts.filter((each) => each.outcome === outcome).length;
          expect(counts.conforming).toBe(having('conforming'));
          expect(counts.nonconforming).toBe(having('nonconforming'));
          expect(counts.notProvenInside).toBe(
            verdicts.filter((each) => each.outcome === 'notProven' && !each.beyond).length,
          );
          expect(counts.refused).toBe(verdicts.filter((each) => !each.accepted).length);
          expect(
            counts.conforming +
              counts.notProvenInside +
              counts.notProvenOutside +
              counts.nonconforming,
          ).toBe(offsets.length);
          expect(counts.beyond).toBe(offsets.filter((offset) => isBeyond(offset, limits)).length);
          const byRule = {
            simple: counts.beyond,
            guardedAcceptance: counts.units - counts.conforming,
            guardedRejection: counts.nonconforming,
          };
          expect(counts.refused).toBe(byRule[rule.kind]);
        },
      ),
    );
  });

  it('says when guard bands leave no room', () => {
    expect(acceptanceLimits(limits, guarded, 11).empty).toBe(true);
    expect(acceptanceLimits(limits, guarded, 10).empty).toBe(false);
  });

  it('names bad input', () => {
    expect(() => unitVerdict(Number.NaN, limits, simple, 1)).toThrow(/offsetPpm/);
    expect(() => unitVerdict(0, { lowPpm: 5, highPpm: -5 }, simple, 1)).toThrow(/limits/);
    expect(() => unitVerdict(0, { lowPpm: null, highPpm: null }, simple, 1)).toThrow(/limit/);
    expect(() => unitVerdict(0, limits, guarded, -1)).toThrow(/expandedUncertaintyPpm/);
  });
});

describe('risks', () => {
  it('keep conforming and nonconforming complementary and in bounds', () => {
    fc.assert(
      fc.property(anyOffset, fc.double({ min: 0.01, max: 5, noNaN: true }), (offset, u) => {
        const { conforming, nonconforming } = conformingProbability(offset, u, limits);
        expect(conforming + nonconforming).toBeCloseTo(1, 12);
        expect(conforming).toBeGreaterThanOrEqual(0);
        expect(nonconforming).toBeGreaterThanOrEqual(0);
      }),
    );
  });

  it('trade: a wider guard band lowers the consumer’s and raises the producer’s risk', () => {
    fc.assert(
      fc.property(
        fc.double({ min: -5, max: 5, noNaN: true }),
        fc.double({ min: 1, max: 8, noNaN: true }),
        fc.double({ min: 0.001, max: 2, noNaN: true }),
        (meanPpm, sdPpm, u) => {
          const at = (factor: number) =>
            globalRisk(
              { meanPpm, sdPpm },
              u,
              limits,
              acceptanceLimits(limits, { kind: 'guardedAcceptance', factor }, u),
            );
          const [none, one] = [at(0), at(1)];
          expect(one.consumersRisk).toBeLessThanOrEqual(none.consumersRisk + 1e-13);
          expect(one.producersRisk).toBeGreaterThanOrEqual(none.producersRisk - 1e-13);
          expect(none.conformingBefore - none.producersRisk + none.consumersRisk).toBeCloseTo(
            none.accepted,
            10,
          );
        },
      ),
      { numRuns: 40 },
    );
  });
});

describe('global risk where nothing can be accepted', () => {
  it('falls wholly on the producer', () => {
    const acceptance = acceptanceLimits(limits, guarded, 11);
    const risk = globalRisk({ meanPpm: 0, sdPpm: 4 }, 1, limits, acceptance);
    expect(risk).toMatchObject({ accepted: 0, consumersRisk: 0, conformingOfAccepted: null });
    expect(risk.producersRisk).toBe(risk.conformingBefore);
  });
});

describe('uncertainty of the lot mean', () => {
  const session = { units: 100, timeBase: 'bench 3', timeBaseStandardPpm: 0.1 };

  it('averages the units but not the time base', () => {
    const few = lotMeanUncertainty({ sessions: [session], spreadPpm: 2 });
    expect(few.samplingPpm).toBeCloseTo(0.2, 12);
    expect(few.commonPpm).toBeCloseTo(0.1, 12);
    const many = lotMeanUncertainty({ sessions: [{ ...session, units: 1_000_000 }], spreadPpm: 2 });
    expect(many.combinedPpm).toBeGreaterThan(0.1);
    expect(many.commonShare).toBeGreaterThan(0.99);
  });

  it('adds sessions on one time base, and joins different ones by root-sum-square', () => {
    const half = { ...session, units: 50 };
    expect(lotMeanUncertainty({ sessions: [half, half], spreadPpm: 2 }).commonPpm).toBeCloseTo(
      0.1,
      12,
    );
    const other = lotMeanUncertainty({
      sessions: [half, { ...half, timeBase: 'bench 4' }],
      spreadPpm: 2,
    });
    expect(other.commonPpm).toBeCloseTo(0.1 / Math.SQRT2, 12);
  });

  it('leaves only repeatability and time base once every unit is measured', () => {
    const all = lotMeanUncertainty({
      sessions: [session],
      spreadPpm: 2,
      repeatabilityPpm: 0.05,
      lotSize: 100,
    });
    expect(all.samplingPpm).toBeCloseTo(0.005, 12);
  });

  it('widens k for few units', () => {
    // Student's t, 95 %, 4 degrees: 2.776 (standard tables).
    const five = lotMeanUncertainty({
      sessions: [{ units: 5, timeBase: 'a', timeBaseStandardPpm: 0 }],
      spreadPpm: 1,
    });
    expect(five.coverageFactor).toBeCloseTo(2.776, 3);
  });

  it('never falls below the time base', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 2, max: 1e6 }),
        fc.double({ min: 0.01, max: 10, noNaN: true }),
        fc.double({ min: 0, max: 1, noNaN: true }),
        (units, spreadPpm, u) => {
          const { combinedPpm } = lotMeanUncertainty({
            sessions: [{ units, timeBase: 'a', timeBaseStandardPpm: u }],
            spreadPpm,
          });
          expect(combinedPpm).toBeGreaterThanOrEqual(u);
        },
      ),
    );
  });

  it('names bad input', () => {
    expect(() => lotMeanUncertainty({ sessions: [], spreadPpm: 1 })).toThrow(/sessions/);
    expect(() => lotMeanUncertainty({ sessions: [session], spreadPpm: 1, lotSize: 99 })).toThrow(
      /lotSize/,
    );
    expect(() =>
      counterUncertainty({
        nominalHz: 1e7,
        readingsHz: [1e7],
        gateS: 1,
        counter: { kind: 'direct' },
        timeBase: { form: 'standard', ppb: 1 },
      }),
    ).toThrow(/readingsHz/);
  });
});
