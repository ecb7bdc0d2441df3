import { ReceiverCriteriaFields, type ReceiverCriteria } from '@shared/contract/receivers';
import {
  fieldsOfIssues,
  fromPercent,
  toPercent,
  type FormValues,
} from '@/components/criteria/form-values';

type Plain = Omit<ReceiverCriteria, 'shareOfSymbolRate' | 'allowedShareBeyond'>;

/** Criteria as a form holds them: shares in percent, as they are spoken of. */
export interface ReceiverCriteriaValues extends FormValues<Plain> {
  shareOfSymbolRatePercent: number | null;
  allowedShareBeyondPercent: number | null;
}

/** Names that the form gives to what the contract calls otherwise. */
export const renamed = {
  shareOfSymbolRate: 'shareOfSymbolRatePercent',
  allowedShareBeyond: 'allowedShareBeyondPercent',
};

export function emptyCriteria(): ReceiverCriteriaValues {
  return {
    carrierHz: '',
    symbolRateHz: '',
    pulse: 'root_raised_cosine',
    rollOff: null,
    frontEndBandwidthHz: '',
    shareOfSymbolRatePercent: 15,
    farEndTolerancePpm: null,
    farEndModel: 'uniform',
    greatestSpeedMps: 0,
    serviceLifeYears: 10,
    allowedShareBeyondPercent: 1,
    airInterfaceId: null,
  };
}

export function valuesOf({
  shareOfSymbolRate,
  allowedShareBeyond,
  ...plain
}: ReceiverCriteria): ReceiverCriteriaValues {
  return {
    ...plain,
    shareOfSymbolRatePercent: toPercent(shareOfSymbolRate),
    allowedShareBeyondPercent: toPercent(allowedShareBeyond),
  };
}

/** The criteria of a form's values, with only what belongs to them; checked by the contract before they are sent. */
export function criteriaOf(values: ReceiverCriteriaValues): ReceiverCriteria {
  return {
    carrierHz: values.carrierHz,
    symbolRateHz: values.symbolRateHz,
    pulse: values.pulse,
    rollOff: values.pulse === 'rectangular' ? null : values.rollOff,
    frontEndBandwidthHz: values.frontEndBandwidthHz,
    shareOfSymbolRate: fromPercent(values.shareOfSymbolRatePercent) as number,
    farEndTolerancePpm: values.farEndTolerancePpm as number,
    farEndModel: values.farEndModel,
    greatestSpeedMps: values.greatestSpeedMps as number,
    serviceLifeYears: values.serviceLifeYears as number,
    allowedShareBeyond: fromPercent(values.allowedShareBeyondPercent) as number,
    airInterfaceId: values.airInterfaceId,
  };
}

type Translate = (key: string, values?: Record<string, unknown>) => string;

export function criteriaErrors(
  values: ReceiverCriteriaValues,
  t: Translate,
): Record<string, string> {
  const { error } = ReceiverCriteriaFields.safeParse(criteriaOf(values));
  return fieldsOfIssues(error?.issues ?? [], t, renamed);
}

/** Complete and coherent criteria, or null while something is missing. */
export const completeCriteria = (values: ReceiverCriteriaValues): ReceiverCriteria | null =>
  ReceiverCriteriaFields.safeParse(criteriaOf(values)).data ?? null;
