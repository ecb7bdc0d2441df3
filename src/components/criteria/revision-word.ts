import { type z } from 'zod';
import { type RevisionHead } from '@shared/contract/revisions';
import { date } from '@shared/format/dates';

export type Head = z.infer<typeof RevisionHead>;
type Translate = (key: string, values?: Record<string, unknown>) => string;

/** Where a revision stands: draft, in force since, to come, or followed by another. */
export function revisionWord(
  { state, inForce, effectiveFrom }: Pick<Head, 'state' | 'inForce' | 'effectiveFrom'>,
  today: string,
  t: Translate,
): string {
  if (state === 'draft') return t('criteria.draft');
  if (state === 'withdrawn') return t('criteria.withdrawn');
  const day = date(effectiveFrom);
  if (inForce) return t('criteria.inForce', { day });
  return effectiveFrom !== null && effectiveFrom > today
    ? t('criteria.comes', { day })
    : t('criteria.superseded', { day });
}

/** The next name of a revision: B after A, 4 after 3; empty where neither says what follows. */
export function nextRevisionName(names: readonly string[]): string {
  const last = names[0] ?? '';
  if (last === '') return 'A';
  if (/^\d+$/.test(last)) return String(Number(last) + 1);
  if (/^[A-Y]$/i.test(last)) {
    const next = String.fromCharCode(last.charCodeAt(0) + 1);
    return names.includes(next) ? '' : next;
  }
  return '';
}
