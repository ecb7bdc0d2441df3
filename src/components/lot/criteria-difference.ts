import { type PartCriteria } from '@shared/contract/parts';

export interface Difference {
  field: keyof PartCriteria;
  before: PartCriteria[keyof PartCriteria];
  after: PartCriteria[keyof PartCriteria];
}

/** Every criterion that two revisions of a part differ in, in the order of the contract. */
export function criteriaDifference(before: PartCriteria, after: PartCriteria): Difference[] {
  const fields = Object.keys({ ...before, ...after }) as (keyof PartCriteria)[];
  return fields
    .filter((field) => JSON.stringify(before[field]) !== JSON.stringify(after[field]))
    .map((field) => ({ field, before: before[field], after: after[field] }));
}
