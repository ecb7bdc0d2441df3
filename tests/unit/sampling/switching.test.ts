import { describe, expect, it } from 'vitest';
import fc from 'fast-check';
import { switchingState, type SwitchingLot } from '@shared/sampling/switching';
import { type SamplingRule } from '@shared/sampling/rule';

const rule: SamplingRule = { kind: 'attribute', level: 'II', aqlPercent: 0.25 };
const looseRule: SamplingRule = { kind: 'attribute', level: 'II', aqlPercent: 1 };

const lots = (pattern: string, more: Partial<SwitchingLot> = {}): SwitchingLot[] =>
  [...pattern].map((mark, index) => ({
    lotNumber: `L${index + 1}`,
    lotSize: 3000,
    accepted: mark === '+',
    beyond: mark === '+' ? 0 : 5,
    ...more,
  }));
const stateAfter = (pattern: string) => switchingState(rule, lots(pattern)).state;

describe('switching', () => {
  it('starts normal and says that nothing has been judged', () => {
    const result = switchingState(rule, []);
    expect(result).toMatchObject({ state: 'normal', severity: 'normal', score: 0, changes: [] });
    expect(result.sentences[0]).toContain('no lot of this part');
  });

  it('tightens at two refused lots within five', () => {
    expect(stateAfter('-')).toBe('normal');
    expect(stateAfter('--')).toBe('tightened');
    expect(stateAfter('-+++-')).toBe('tightened');
    expect(stateAfter('-++++-')).toBe('normal');
    const result = switchingState(rule, lots('-+-'));
    expect(result.sentences[0]).toContain('Tightened inspection since lot L3');
    expect(result.sentences[0]).toContain(
      'two of the last three lots were not accepted (L1 and L3)',
    );
  });

  it('returns to normal after five accepted in a row', () => {
    expect(stateAfter('--++++')).toBe('tightened');
    expect(stateAfter('--+++++')).toBe('normal');
    expect(stateAfter('--++++-++++')).toBe('tightened');
    expect(switchingState(rule, lots('--+++')).sentences[1]).toContain('so far three lots');
  });

  it('discontinues at five refused while tightened, and resumes tightened once action is agreed', () => {
    expect(stateAfter('--+-+-+-+-+-')).toBe('discontinued');
    expect(stateAfter('--+-+-+-+-')).toBe('tightened');
    const stopped = lots('-------');
    expect(switchingState(rule, stopped)).toMatchObject({
      state: 'discontinued',
      severity: 'tightened',
    });
    const resumed = [
      ...stopped,
      { ...lots('+')[0]!, lotNumber: 'L8', correctiveActionAgreed: true },
    ];
    expect(switchingState(rule, resumed).state).toBe('tightened');
    expect(switchingState(rule, resumed).sentences[0]).toContain('corrective action');
  });

  it('reduces after fifteen accepted lots of a plan that accepts 0 or 1, ten of a larger one', () => {
    expect(stateAfter('+'.repeat(14))).toBe('normal');
    expect(stateAfter('+'.repeat(15))).toBe('reduced');
    // AQL 1 %, letter K: accept on 3; each lot adds 3.
    expect(switchingState(looseRule, lots('+'.repeat(9))).score).toBe(27);
    expect(switchingState(looseRule, lots('+'.repeat(10))).state).toBe('reduced');
  });

  it('starts the score again when a lot would have failed one step tighter', () => {
    // AQL 1 %, letter K accepts 3; AQL 0.65 % accepts 2. Three found: accepted, but the score falls to nought.
    const record = [...lots('+'.repeat(9)), { ...lots('+')[0]!, beyond: 3 }];
    expect(switchingState(looseRule, record)).toMatchObject({ state: 'normal', score: 0 });
  });

  it('needs consent and steady production for reduced inspection', () => {
    const many = lots('+'.repeat(20));
    const refused = switchingState(rule, many, { reducedAllowed: false });
    expect(refused.state).toBe('normal');
    expect(refused.sentences.join(' ')).toContain('has not been allowed');
    expect(switchingState(rule, lots('+'.repeat(20), { productionSteady: false })).state).toBe(
      'normal',
    );
  });

  it('leaves reduced inspection for a refused lot, a count between the numbers, or unsteady production', () => {
    const reduced = lots('+'.repeat(15));
    const next = (lot: Partial<SwitchingLot>) =>
      switchingState(rule, [...reduced, { ...lots('+')[0]!, lotNumber: 'next', ...lot }]).state;
    expect(next({})).toBe('reduced');
    expect(next({ accepted: false, beyond: 3 })).toBe('normal');
    expect(next({ beyond: 1 })).toBe('normal');
    expect(next({ productionSteady: false })).toBe('normal');
  });

  it('does not count a lot offered again', () => {
    const record = [...lots('-'), { ...lots('-')[0]!, resubmitted: true }];
    expect(switchingState(rule, record).state).toBe('normal');
  });

  it('has one severity where there is nothing to switch', () => {
    const zero: SamplingRule = {
      kind: 'zeroAcceptance',
      limitingQualityPercent: 1,
      consumersRisk: 0.1,
    };
    expect(switchingState(zero, lots('------'))).toMatchObject({ state: 'normal', changes: [] });
    expect(
      switchingState({ kind: 'everyUnit', allowedNonconforming: 0 }, lots('--')).sentences[0],
    ).toContain('Every unit');
  });

  it('always explains itself, and each change starts where the last one ended', () => {
    fc.assert(
      fc.property(fc.array(fc.constantFrom('+', '+', '+', '-'), { maxLength: 80 }), (marks) => {
        const { state, severity, sentences, changes, score } = switchingState(
          rule,
          lots(marks.join('')),
        );
        expect(sentences.length).toBeGreaterThan(0);
        expect(sentences.every((sentence) => /^[A-Z].*\.$/.test(sentence))).toBe(true);
        changes.forEach((change, index) =>
          expect(change.from).toBe(changes[index - 1]?.to ?? 'normal'),
        );
        expect(changes[changes.length - 1]?.to ?? 'normal').toBe(state);
        expect(severity).toBe(state === 'discontinued' ? 'tightened' : state);
        expect(score).toBeLessThanOrEqual(30);
      }),
    );
  });
});

describe('corrective action agreed after the last lot', () => {
  it('ends a discontinuation for the next lot, and nothing else', () => {
    const agreed = { correctiveActionAgreed: true };
    const resumed = switchingState(rule, lots('-------'), agreed);
    expect(resumed).toMatchObject({ state: 'tightened', severity: 'tightened' });
    expect(resumed.changes.at(-1)).toMatchObject({ afterLot: 'L7', from: 'discontinued' });
    expect(switchingState(rule, lots('--'), agreed).changes).toHaveLength(1);
    expect(switchingState(rule, [], agreed).state).toBe('normal');
  });
});
