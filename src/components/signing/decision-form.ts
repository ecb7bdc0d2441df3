import { type z } from 'zod';
import { SignDisposition, sortLot, type Decision } from '@shared/contract/dispositions';
import { ApiError } from '@/api/api-error';
import { type FieldErrors } from '@/composables/useForm';

/** What one may choose: the decisions of the contract, and sorting once every unit is measured. */
export type Choice = Decision | 'sort';
export type Treatment = 'return_to_supplier' | 'scrap';

export interface DecisionValues {
  decision: Choice | null;
  reason: string;
  password: string;
  treatment: Treatment | null;
  acknowledgementDays: number | null;
  answerDays: number | null;
  containLotIds: string[];
  greatestQuantity: number | null;
  until: string;
  nonconformity: string;
  customerReference: string;
  correction: string;
  subLotNumber: string;
}

export function emptyDecision(): DecisionValues {
  return {
    decision: null,
    reason: '',
    password: '',
    treatment: null,
    acknowledgementDays: 2,
    answerDays: 10,
    containLotIds: [],
    greatestQuantity: null,
    until: '',
    nonconformity: '',
    customerReference: '',
    correction: '',
    subLotNumber: '',
  };
}

/** Only what the decision asks for is sent: what was written for another choice stays behind. */
export function decisionBody(
  values: DecisionValues,
  analysisId: string,
): z.input<typeof SignDisposition> {
  const { decision, reason, password } = values;
  const common = { decision: decision as Decision, analysisId, reason, password };
  switch (decision) {
    case 'hold':
      return {
        ...common,
        acknowledgementDays: values.acknowledgementDays ?? undefined,
        answerDays: values.answerDays ?? undefined,
        containLotIds: values.containLotIds,
      };
    case 'reject':
      return { ...common, treatment: values.treatment ?? undefined };
    case 'accept_under_concession':
      return {
        ...common,
        concession: {
          greatestQuantity: values.greatestQuantity,
          until: values.until || null,
          nonconformity: values.nonconformity,
          customerReference: values.customerReference,
        },
      };
    case 'accept':
      return values.correction.trim() ? { ...common, correction: values.correction } : common;
    default:
      return common;
  }
}

export function sortingBody(values: DecisionValues, analysisId: string) {
  const { reason, password, subLotNumber, treatment } = values;
  return { reason, password, subLotNumber, treatment: treatment as Treatment, analysisId };
}

export interface DecisionTexts {
  choose: string;
  correction: string;
  subLotNumber: string;
  treatment: string;
  days: string;
}

/** What is wrong with the form, field by field, by the rules of the contract. */
export function decisionErrors(
  values: DecisionValues,
  { analysisId, isOnHold }: { analysisId: string; isOnHold: boolean },
  texts: DecisionTexts,
): FieldErrors<DecisionValues> {
  const errors: FieldErrors<DecisionValues> = {};
  if (values.decision === null) errors.decision = texts.choose;
  if (values.decision === 'accept' && isOnHold && values.correction.trim().length < 3)
    errors.correction = texts.correction;
  if (values.decision === 'hold') {
    // An emptied or unreadable number would silently become the server's standing value.
    if (values.acknowledgementDays === null) errors.acknowledgementDays = texts.days;
    if (values.answerDays === null) errors.answerDays = texts.days;
  }
  const checked =
    values.decision === 'sort'
      ? sortLot.body!.safeParse(sortingBody(values, analysisId))
      : SignDisposition.safeParse(decisionBody(values, analysisId));
  for (const { path, message } of checked.error?.issues ?? []) {
    const field = formField(path.map(String).join('.'));
    if (field === 'decision' || field in errors) continue;
    if (values.decision === 'sort' && (field === 'subLotNumber' || field === 'treatment'))
      errors[field] = texts[field];
    else errors[field] = message;
  }
  return errors;
}

/** The form's field for a path of the contract. A concession as a whole is mended where it is limited. */
export function formField(path: string): keyof DecisionValues {
  if (path === 'concession') return 'greatestQuantity';
  return path.split('.').at(-1) as keyof DecisionValues;
}

/** Errors of the server stand at the form's own fields. */
export function withFormFields(error: unknown): unknown {
  if (!(error instanceof ApiError)) return error;
  const fields = Object.fromEntries(
    Object.entries(error.fields).map(([path, message]) => [formField(path), message]),
  );
  return new ApiError(error.status, error.code, error.message, fields);
}
