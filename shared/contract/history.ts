import { z } from 'zod';
import { endpoint } from './endpoint';
import { Id, IdParams, Instant, ListQuery, houseRoles, listOf } from './common';

const readers = ['auditor', 'quality_engineer', 'administrator'] as const;

export const HistoryEntry = z.object({
  sequence: z.number().int(),
  id: Id,
  at: Instant,
  act: z.string(),
  actor: z.object({ id: z.string(), name: z.string(), role: z.string() }),
  recordType: z.string(),
  recordId: z.string(),
  recordLabel: z.string(),
  lotId: Id.nullable(),
  before: z.record(z.string(), z.unknown()).nullable(),
  after: z.record(z.string(), z.unknown()).nullable(),
  reason: z.string(),
  previousHash: z.string(),
  hash: z.string(),
});
export type HistoryEntry = z.infer<typeof HistoryEntry>;
export const HistoryFilter = z.object({
  find: z.string().max(200).optional(),
  act: z.string().max(80).optional(),
  actorId: z.string().max(80).optional(),
  recordType: z.string().max(40).optional(),
  recordId: z.string().max(80).optional(),
  lotId: Id.optional(),
  from: z.string().max(40).optional(),
  to: z.string().max(40).optional(),
  field: z.string().max(80).optional(),
  /** One entry by its number. */
  sequence: z.coerce.number().int().positive().optional(),
});
export const listHistory = endpoint({
  method: 'get',
  path: '/api/history',
  roles: readers,
  summary: 'Signed history, newest first',
  query: ListQuery.extend(HistoryFilter.shape),
  answer: listOf(HistoryEntry),
});
export const lotHistory = endpoint({
  method: 'get',
  path: '/api/lots/:id/history',
  roles: houseRoles,
  params: IdParams,
  summary: 'History of one lot',
  query: ListQuery,
  answer: listOf(HistoryEntry),
});
export const listActs = endpoint({
  method: 'get',
  path: '/api/history/acts',
  roles: readers,
  summary: 'Acts, record types and people that occur, for filters',
  answer: z.object({
    acts: z.array(z.string()),
    recordTypes: z.array(z.string()),
    people: z.array(z.object({ id: z.string(), name: z.string() })),
  }),
});
export const exportHistory = endpoint({
  method: 'get',
  path: '/api/history/export',
  roles: readers,
  summary: 'The filtered range with a manifest, to be checked off line',
  query: HistoryFilter,
  produces: 'application/json',
});
export const exportHistoryCsv = endpoint({
  method: 'get',
  path: '/api/history.csv',
  roles: readers,
  summary: 'The filtered range as CSV',
  query: HistoryFilter,
  produces: 'text/csv',
});

export const Verification = z.object({
  ok: z.boolean(),
  entriesChecked: z.number().int(),
  firstBroken: z.object({ sequence: z.number().int(), reason: z.string() }).nullable(),
  head: z.string(),
  count: z.number().int(),
  checkpointsChecked: z.number().int(),
  startedAt: Instant,
  finishedAt: Instant,
  /** Said plainly on the page: what this does not prove. */
  caveat: z.string(),
});
export type Verification = z.infer<typeof Verification>;
export const verifyHistory = endpoint({
  method: 'get',
  path: '/api/history/verification',
  roles: readers,
  summary: 'Check the whole chain now; names the first broken entry',
  answer: Verification,
});
export const streamVerification = endpoint({
  method: 'get',
  path: '/api/history/verification/events',
  roles: readers,
  summary: 'Check the chain with progress, as server-sent events',
  produces: 'text/event-stream',
});
export const lastVerification = endpoint({
  method: 'get',
  path: '/api/history/verification/last',
  roles: readers,
  summary: 'Outcome of the nightly check',
  answer: z.object({ last: Verification.nullable() }),
});

export const Checkpoint = z.object({
  id: Id,
  count: z.number().int(),
  head: z.string(),
  at: Instant,
  signature: z.string(),
  publicKey: z.string(),
});
export const listCheckpoints = endpoint({
  method: 'get',
  path: '/api/history/checkpoints',
  roles: readers,
  summary: 'Signed checkpoints',
  query: ListQuery,
  answer: listOf(Checkpoint),
});
export const makeCheckpoint = endpoint({
  method: 'post',
  path: '/api/history/checkpoints',
  roles: ['auditor', 'administrator'],
  summary: 'Sign a checkpoint of the chain now',
  body: z.object({}),
  answer: Checkpoint,
  status: 201,
});
export const readVerifier = endpoint({
  method: 'get',
  path: '/api/history/verifier.mjs',
  roles: readers,
  summary: 'The stand-alone verifier',
  produces: 'text/javascript',
});
export const readRecordAt = endpoint({
  method: 'get',
  path: '/api/history/records/:recordType/:recordId',
  roles: readers,
  params: z.object({ recordType: z.string().max(40), recordId: z.string().max(80) }),
  summary: 'A record as it stood after a given entry',
  query: z.object({ sequence: z.coerce.number().int().optional() }),
  answer: z.object({
    recordType: z.string(),
    recordId: z.string(),
    sequence: z.number().int(),
    fields: z.record(z.string(), z.unknown()),
  }),
});
export const IdOnly = IdParams;
