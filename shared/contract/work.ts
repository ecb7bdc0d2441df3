import { z } from 'zod';
import { endpoint } from './endpoint';
import { Id, Instant, OptionalShortText, Ok, houseRoles } from './common';
import { HoldRow } from './holds';
import { LotRow } from './lots';

/** "My work": what waits for the person who asks, longest first; an empty section says so in `empty`. */
export const WorkSection = z.object({
  key: z.string(),
  title: z.string(),
  hint: z.string(),
  empty: z.string(),
  lots: z.array(LotRow),
  holds: z.array(HoldRow),
  tasks: z.array(
    z.object({ text: z.string(), to: z.string(), since: Instant.nullable(), overdue: z.boolean() }),
  ),
  more: z.number().int(),
});
export const MyWork = z.object({
  headline: z.string(),
  subline: z.string(),
  sections: z.array(WorkSection),
});
export type MyWork = z.infer<typeof MyWork>;
export const readWork = endpoint({
  method: 'get',
  path: '/api/work',
  roles: 'signedIn',
  summary: 'What waits for me',
  answer: MyWork,
});

export const FindHit = z.object({
  kind: z.enum(['lot', 'part', 'serial', 'supplier', 'receiver', 'hold']),
  id: Id,
  label: z.string(),
  detail: z.string(),
  to: z.string(),
});
export const find = endpoint({
  method: 'get',
  path: '/api/find',
  roles: 'signedIn',
  summary: 'Lots, parts and serial numbers; a supplier contact finds only own holds',
  query: z.object({ find: z.string().trim().min(1).max(200) }),
  answer: z.object({ items: z.array(FindHit), next: z.null() }),
});

/** Choice of columns per table, kept with the person. */
export const TablePreference = z.object({ columns: z.array(z.string().max(60)).max(60) });
export const readPreferences = endpoint({
  method: 'get',
  path: '/api/preferences',
  roles: 'signedIn',
  summary: 'My preferences',
  answer: z.object({ tables: z.record(z.string(), TablePreference) }),
});
export const setTablePreference = endpoint({
  method: 'put',
  path: '/api/preferences/tables/:table',
  roles: 'signedIn',
  summary: 'Keep my choice of columns',
  params: z.object({ table: z.string().regex(/^[a-z-]{1,40}$/) }),
  body: TablePreference,
  answer: Ok,
});

export const SavedFilter = z.object({
  id: Id,
  list: z.string(),
  name: z.string(),
  query: z.string(),
  sharedWithRole: z.boolean(),
  mine: z.boolean(),
});
export const listFilters = endpoint({
  method: 'get',
  path: '/api/saved-filters',
  roles: houseRoles,
  summary: 'Saved filters: mine and shared ones',
  query: z.object({ list: z.string().max(40).optional() }),
  answer: z.object({ items: z.array(SavedFilter), next: z.null() }),
});
export const saveFilter = endpoint({
  method: 'post',
  path: '/api/saved-filters',
  roles: houseRoles,
  summary: 'Save the filter of a list under a name',
  body: z.object({
    list: z.string().regex(/^[a-z-]{1,40}$/),
    name: z.string().trim().min(1, 'Give it a name.').max(80),
    query: z.string().max(2000),
    sharedWithRole: z.boolean().default(false),
    note: OptionalShortText,
  }),
  answer: SavedFilter,
  status: 201,
});
export const deleteFilter = endpoint({
  method: 'delete',
  path: '/api/saved-filters/:id',
  roles: houseRoles,
  summary: 'Delete one of my filters',
  params: z.object({ id: Id }),
  answer: Ok,
});
