import { z } from 'zod';
import { endpoint } from './endpoint';
import {
  Id,
  IdParams,
  Instant,
  IsoDate,
  ListQuery,
  Ok,
  OptionalShortText,
  ShortText,
  houseRoles,
  listOf,
} from './common';

export const Bench = z.object({
  id: Id,
  name: z.string(),
  counter: z.string(),
  location: z.string(),
  /** Expanded uncertainty U of one frequency reading, in ppm of the reading. */
  expandedUncertaintyPpm: z.number(),
  coverageFactor: z.number(),
  calibrationDue: IsoDate,
  calibrationReference: z.string(),
  inCalibration: z.boolean(),
  chamberLowC: z.number().nullable(),
  chamberHighC: z.number().nullable(),
  /** Taken for an upload that names no bench. */
  usual: z.boolean(),
  active: z.boolean(),
  version: z.number().int(),
  createdAt: Instant,
});
export type Bench = z.infer<typeof Bench>;

export const BenchFields = z.object({
  name: ShortText,
  counter: ShortText,
  location: OptionalShortText,
  expandedUncertaintyPpm: z.number().positive('This must be greater than zero.').max(1000),
  coverageFactor: z.number().min(1).max(4).default(2),
  calibrationDue: IsoDate,
  calibrationReference: OptionalShortText,
  chamberLowC: z.number().min(-273).max(500).nullable().default(null),
  chamberHighC: z.number().min(-273).max(500).nullable().default(null),
  usual: z.boolean().default(false),
  active: z.boolean().default(true),
});

export const listBenches = endpoint({
  method: 'get',
  path: '/api/benches',
  roles: houseRoles,
  summary: 'Benches',
  query: ListQuery.extend({ find: z.string().max(200).optional() }),
  answer: listOf(Bench),
});
export const addBench = endpoint({
  method: 'post',
  path: '/api/benches',
  roles: ['administrator'],
  summary: 'Add a bench',
  body: BenchFields,
  answer: Bench,
  status: 201,
});
export const readBench = endpoint({
  method: 'get',
  path: '/api/benches/:id',
  roles: houseRoles,
  summary: 'A bench',
  params: IdParams,
  answer: Bench,
});
export const changeBench = endpoint({
  method: 'put',
  path: '/api/benches/:id',
  roles: ['administrator'],
  summary: 'Change a bench',
  params: IdParams,
  body: BenchFields.extend({ version: z.number().int() }),
  answer: Bench,
});

export const BenchToken = z.object({
  id: Id,
  label: z.string(),
  createdAt: Instant,
  lastUsedAt: Instant.nullable(),
  revokedAt: Instant.nullable(),
});
export const listBenchTokens = endpoint({
  method: 'get',
  path: '/api/benches/:id/tokens',
  roles: ['administrator'],
  summary: 'Tokens of a bench',
  params: IdParams,
  answer: listOf(BenchToken),
});
export const issueBenchToken = endpoint({
  method: 'post',
  path: '/api/benches/:id/tokens',
  roles: ['administrator'],
  summary: 'Issue a token for uploads by machine; the secret is shown once',
  params: IdParams,
  body: z.object({ label: ShortText }),
  answer: BenchToken.extend({ secret: z.string() }),
  status: 201,
});
export const revokeBenchToken = endpoint({
  method: 'delete',
  path: '/api/benches/:id/tokens/:tokenId',
  roles: ['administrator'],
  summary: 'Revoke a token',
  params: z.object({ id: Id, tokenId: Id }),
  answer: Ok,
});
