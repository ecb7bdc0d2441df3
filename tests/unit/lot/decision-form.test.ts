import { describe, expect, test } from 'vitest';
import { ApiError } from '@/api/api-error';
import { actOf } from '@/components/signing/act-of-lot';
import {
  decisionBody,
  decisionErrors,
  emptyDecision,
  withFormFields,
  type DecisionValues,
} from '@/components/signing/decision-form';
import { choicesOf } from '@/components/signing/useDecision';
import { SignDisposition } from '@shared/contract/dispositions';
import { dispositionFixture, lotFixture } from '../../support/lot-fixture';

const texts = {
  choose: 'choose',
  correction: 'correction',
  subLotNumber: 'number',
  treatment: 'treatment',
  days: 'days',
};
const { lot, analysis } = lotFixture();
const signed = (values: Partial<DecisionValues>): DecisionValues => ({
  ...emptyDecision(),
  reason: 'Three beyond, one allowed.',
  password: 'a heron waits on the weir',
  ...values,
});
const wrong = (values: Partial<DecisionValues>, isOnHold = false) =>
  Object.keys(decisionErrors(signed(values), { analysisId: analysis.id, isOnHold }, texts)).sort();

describe('each decision asks for exactly what it needs', () => {
  test('nothing chosen', () => expect(wrong({})).toEqual(['decision']));
  test('accept', () => expect(wrong({ decision: 'accept' })).toEqual([]));
  test('accept after a hold names the correction', () => {
    expect(wrong({ decision: 'accept' }, true)).toEqual(['correction']);
    expect(wrong({ decision: 'accept', correction: 'Sorted by the supplier.' }, true)).toEqual([]);
  });
  test('hold gives the supplier days', () => {
    expect(wrong({ decision: 'hold' })).toEqual([]);
    expect(wrong({ decision: 'hold', answerDays: null })).toEqual(['answerDays']);
    expect(wrong({ decision: 'hold', acknowledgementDays: 61 })).toEqual(['acknowledgementDays']);
  });
  test('reject says what happens to the units', () => {
    expect(wrong({ decision: 'reject' })).toEqual(['treatment']);
    expect(wrong({ decision: 'reject', treatment: 'scrap' })).toEqual([]);
  });
  test('a concession is limited and names what does not conform', () => {
    expect(wrong({ decision: 'accept_under_concession' })).toContain('nonconformity');
    const named = { decision: 'accept_under_concession', nonconformity: 'Three beyond.' } as const;
    expect(wrong(named)).toEqual(['greatestQuantity']);
    expect(wrong({ ...named, until: '2027-03-31' })).toEqual([]);
    expect(wrong({ ...named, greatestQuantity: 500 })).toEqual([]);
  });
  test('sorting names the new lot and what happens to the rest', () => {
    expect(wrong({ decision: 'sort' })).toEqual(['subLotNumber', 'treatment']);
  });
  test('every signature needs a reason and the password', () =>
    expect(wrong({ decision: 'accept', reason: '', password: '' })).toEqual([
      'password',
      'reason',
    ]));
});

test('what was written for another choice is not sent', () => {
  const values = signed({ decision: 'accept', treatment: 'scrap', nonconformity: 'x'.repeat(5) });
  const body = decisionBody(values, analysis.id);
  expect(Object.keys(body).sort()).toEqual(['analysisId', 'decision', 'password', 'reason']);
  expect(SignDisposition.safeParse(body).success).toBe(true);
});

test('errors of the server stand at the form’s own fields', () => {
  const error = withFormFields(
    new ApiError(422, 'invalid', 'No.', {
      'concession.nonconformity': 'Longer.',
      concession: 'Limit.',
    }),
  ) as ApiError;
  expect(error.fields).toEqual({ nonconformity: 'Longer.', greatestQuantity: 'Limit.' });
});

describe('what may be chosen', () => {
  test('only what the server allows, the mildest first', () => {
    const may = { ...lot.may, decide: ['reject', 'hold'] };
    expect(choicesOf({ ...lot, may }, analysis)).toEqual(['hold', 'reject']);
  });
  test('sorting appears once every unit is measured and some do not conform', () => {
    const whole = lotFixture({
      units: 300,
      lotSize: 300,
      criteria: { samplingRule: { kind: 'everyUnit', allowedNonconforming: 0 } },
    });
    expect(choicesOf(whole.lot, whole.analysis)).toContain('sort');
    expect(choicesOf(whole.lot, whole.analysis)).not.toContain('inspect_all');
    expect(choicesOf(lot, analysis)).not.toContain('sort');
  });
});

describe('a concession that waits', () => {
  const waiting = dispositionFixture({ lot, analysis }, { state: 'awaiting_second' });
  const may = { ...lot.may, decide: [] };
  test('is countersigned by another engineer', () =>
    expect(
      actOf({ ...lot, may: { ...may, countersign: true } }, [waiting], 'somebody'),
    ).toMatchObject({ kind: 'second', isOwn: false }));
  test('is taken back by its first signer', () =>
    expect(actOf({ ...lot, may }, [waiting], waiting.signedBy.id)).toMatchObject({ isOwn: true }));
  test('is nothing to anybody else', () =>
    expect(actOf({ ...lot, may }, [waiting], 'auditor')).toBeNull());
});
