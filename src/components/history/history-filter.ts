import { type HistoryFilter } from '@/api/history';

/** The filter as the address holds it: every value a text, empty for none. */
export const noFilter = {
  find: '',
  actorId: '',
  act: '',
  recordType: '',
  recordId: '',
  lotId: '',
  field: '',
  from: '',
  to: '',
};
export type FilterState = typeof noFilter;

export function isFiltered(state: FilterState): boolean {
  return Object.values(state).some((value) => value !== '');
}

/** Without the empty ones, so that an export of everything says that it is complete. */
export function filterOf(state: FilterState): HistoryFilter {
  return Object.fromEntries(Object.entries(state).filter(([, value]) => value !== ''));
}
