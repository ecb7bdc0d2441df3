import { type HistoryEntry } from '@/api/history';

export interface Change {
  field: string;
  before: unknown;
  after: unknown;
}

/** What an entry says about its record, field by field; what is the same before and after is no change. */
export function changesOf({ before, after }: Pick<HistoryEntry, 'before' | 'after'>): Change[] {
  const fields = new Set([...Object.keys(before ?? {}), ...Object.keys(after ?? {})]);
  return [...fields]
    .map((field) => ({ field, before: before?.[field], after: after?.[field] }))
    .filter(
      (change) =>
        JSON.stringify(change.before) !== JSON.stringify(change.after) &&
        !(kindOf(change.before) === 'nothing' && kindOf(change.after) === 'nothing'),
    )
    .sort((a, b) => rank(a) - rank(b));
}

/** What changed from one value to another is read first, then what reads as words; ids and whole structures last. */
function rank({ before, after }: Change): number {
  if (kindOf(before) !== 'nothing') return 0;
  return { text: 1, flag: 1, instant: 1, nothing: 2, structure: 3, code: 4 }[kindOf(after)];
}

/** 'correctiveAction' as a person reads it: 'corrective action'. Units at the end stay units. */
export function fieldWords(field: string): string {
  return field
    .replace(/_/g, ' ')
    .replace(/([a-z0-9])([A-Z])/g, '$1 $2')
    .toLowerCase()
    .replace(/ (ppm)$/, ', $1')
    .replace(/ hz$/, ', Hz')
    .replace(/ c$/, ', °C')
    .replace(/ pf$/, ', pF');
}

const instant = /^\d{4}-\d\d-\d\dT\d\d:\d\d:\d\d(\.\d+)?(Z|[+-]\d\d:\d\d)$/;

export type ValueKind = 'nothing' | 'flag' | 'instant' | 'text' | 'code' | 'structure';

/** How a value is to be shown. Ids and hashes are code: they are compared, not read. */
export function kindOf(value: unknown): ValueKind {
  if (value === null || value === undefined || value === '') return 'nothing';
  if (typeof value === 'boolean') return 'flag';
  if (typeof value === 'object') return 'structure';
  const text = String(value);
  if (instant.test(text)) return 'instant';
  return /^[0-9a-f-]{32,}$/i.test(text) ? 'code' : 'text';
}
