import { type z } from 'zod';
import { BenchFields, type Bench } from '@shared/contract/benches';
import { fieldsOfIssues, type FormValues } from '@/components/criteria/form-values';

type Fields = z.output<typeof BenchFields>;
export type BenchValues = FormValues<Fields>;

export const benchValues = (bench?: Bench): BenchValues => ({
  name: bench?.name ?? '',
  counter: bench?.counter ?? '',
  location: bench?.location ?? '',
  expandedUncertaintyPpm: bench?.expandedUncertaintyPpm ?? null,
  coverageFactor: bench?.coverageFactor ?? 2,
  calibrationDue: bench?.calibrationDue ?? '',
  calibrationReference: bench?.calibrationReference ?? '',
  chamberLowC: bench?.chamberLowC ?? null,
  chamberHighC: bench?.chamberHighC ?? null,
  usual: bench?.usual ?? false,
  active: bench?.active ?? true,
});

/** As the contract takes it; checked by it before it is sent. */
export const benchFields = (values: BenchValues): Fields => values as Fields;

type Translate = (key: string, values?: Record<string, unknown>) => string;

export function benchErrors(values: BenchValues, t: Translate): Record<string, string> {
  const errors = fieldsOfIssues(BenchFields.safeParse(values).error?.issues ?? [], t);
  const { chamberLowC: low, chamberHighC: high } = values;
  if ((low === null) !== (high === null)) errors.chamberHighC ??= t('benches.chamberBoth');
  else if (low !== null && high !== null && low >= high)
    errors.chamberHighC ??= t('benches.chamberCrossed');
  return errors;
}
