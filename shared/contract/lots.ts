import { z } from 'zod';
import { endpoint } from './endpoint';
import {
  Id,
  IdParams,
  Instant,
  IsoDate,
  ListQuery,
  OptionalShortText,
  PersonRef,
  SigningFields,
  houseRoles,
  listOf,
} from './common';
import { DeviceKind, PartRevision } from './parts';
import { ReceiverRevision } from './receivers';

export const lotStates = [
  'received',
  'under_inspection',
  'awaiting_disposition',
  'on_hold',
  'accepted',
  'accepted_under_concession',
  'rejected',
] as const;
export const LotState = z.enum(lotStates);
export type LotState = z.infer<typeof LotState>;

export const Severity = z.enum(['normal', 'tightened', 'reduced', 'discontinued']);

/** What a band strip is drawn from; mirrors shared/band-strip/types. */
export const BandStripView = z.object({
  unitsCount: z.number().int(),
  meanPpm: z.number().nullable(),
  sdPpm: z.number().nullable(),
  lowLimitPpm: z.number().nullable(),
  highLimitPpm: z.number().nullable(),
  guardBandPpm: z.number(),
  allowanceLowPpm: z.number().nullable(),
  allowanceHighPpm: z.number().nullable(),
  histogram: z.object({ edgesPpm: z.array(z.number()), counts: z.array(z.number().int()) }),
  beyondPpm: z.array(z.number()),
  beyondCount: z.number().int(),
});

/** Something that stands between the lot and acceptance. */
export const OwedItem = z.object({
  kind: z.enum([
    'units',
    'temperatures',
    'characteristics',
    'bench',
    'warnings',
    'criteria',
    'analysis',
    'uploads_running',
    'discontinued',
  ]),
  text: z.string(),
});

export const LotRow = z.object({
  id: Id,
  lotNumber: z.string(),
  state: LotState,
  stateSince: Instant,
  part: z.object({
    id: Id,
    partNumber: z.string(),
    deviceKind: DeviceKind,
    revision: z.string(),
    nominalFrequencyHz: z.string(),
  }),
  supplier: z.object({ id: Id, name: z.string() }),
  dateCode: z.string(),
  purchaseOrder: z.string(),
  lotSize: z.number().int(),
  receivedOn: IsoDate,
  unitsMeasured: z.number().int(),
  unitsOwed: z.number().int(),
  unitsPlanned: z.number().int(),
  beyondCount: z.number().int().nullable(),
  finding: z.enum(['accept', 'hold']).nullable(),
  bandStrip: BandStripView.nullable(),
  /** One phrase: what comes next, and for whom. */
  next: z.object({ text: z.string(), overdue: z.boolean(), mine: z.boolean() }),
  parentLotId: Id.nullable(),
  version: z.number().int(),
  createdAt: Instant,
});
export type LotRow = z.infer<typeof LotRow>;

export const Lot = LotRow.extend({
  registeredBy: PersonRef,
  partRevision: PartRevision,
  receivers: z.array(ReceiverRevision.extend({ name: z.string() })),
  /** A newer revision exists that this lot is not judged by. */
  newerRevision: z.string().nullable(),
  severity: Severity,
  severityReasons: z.array(z.string()),
  plan: z.object({
    text: z.string(),
    sampleSize: z.number().int(),
    codeLetter: z.string().nullable(),
    acceptanceNumber: z.number().int().nullable(),
    rejectionNumber: z.number().int().nullable(),
    acceptabilityConstant: z.number().nullable(),
  }),
  owed: z.array(OwedItem),
  currentAnalysisId: Id.nullable(),
  openHoldId: Id.nullable(),
  parent: z.object({ id: Id, lotNumber: z.string() }).nullable(),
  subLots: z.array(
    z.object({ id: Id, lotNumber: z.string(), state: LotState, lotSize: z.number().int() }),
  ),
  /** What the person who asks may do now; the rest is hidden, and refused by the server. */
  may: z.object({
    upload: z.boolean(),
    decide: z.array(z.string()),
    countersign: z.boolean(),
    rejudge: z.boolean(),
    withdrawUpload: z.boolean(),
    change: z.boolean(),
  }),
});
export type Lot = z.infer<typeof Lot>;

export const LotNumber = z
  .string()
  .trim()
  .min(1, 'Give the lot its number.')
  .max(80, 'At most 80 characters.')
  .regex(/^[\p{L}\p{N} ._/#-]+$/u, 'Use letters, digits, space and . _ / # -');

export const RegisterLot = z.object({
  lotNumber: LotNumber,
  partId: Id,
  supplierId: Id,
  dateCode: z.string().trim().max(40).default(''),
  purchaseOrder: OptionalShortText,
  lotSize: z.coerce
    .number()
    .int('Whole units only.')
    .min(1, 'At least one unit.')
    .max(10_000_000, 'At most 10 000 000 units.'),
  receivedOn: IsoDate,
});

const states = z
  .union([LotState, z.array(LotState)])
  .transform((s) => (Array.isArray(s) ? s : [s]));
export const LotFilter = z.object({
  find: z.string().max(200).optional(),
  state: z.preprocess((v) => (typeof v === 'string' ? v.split(',') : v), states.optional()),
  supplierId: Id.optional(),
  partId: Id.optional(),
  dateCode: z.string().max(40).optional(),
  purchaseOrder: z.string().max(200).optional(),
  receivedFrom: IsoDate.optional(),
  receivedTo: IsoDate.optional(),
  sort: z
    .enum([
      '-stateSince',
      'stateSince',
      '-receivedOn',
      'receivedOn',
      'lotNumber',
      '-lotNumber',
      '-lotSize',
      'lotSize',
    ])
    .default('-receivedOn'),
});
export const listLots = endpoint({
  method: 'get',
  path: '/api/lots',
  roles: houseRoles,
  summary: 'Lots',
  query: ListQuery.extend(LotFilter.shape),
  answer: listOf(LotRow),
});
export const exportLots = endpoint({
  method: 'get',
  path: '/api/lots.csv',
  roles: houseRoles,
  summary: 'Lots of the filter as CSV',
  query: LotFilter,
  produces: 'text/csv',
});
export const registerLot = endpoint({
  method: 'post',
  path: '/api/lots',
  roles: ['technician', 'quality_engineer'],
  summary: 'Register a lot',
  body: RegisterLot,
  answer: Lot,
  status: 201,
});
export const readLot = endpoint({
  method: 'get',
  path: '/api/lots/:id',
  roles: houseRoles,
  summary: 'A lot',
  params: IdParams,
  answer: Lot,
});
export const changeLot = endpoint({
  method: 'put',
  path: '/api/lots/:id',
  roles: ['technician', 'quality_engineer'],
  summary: 'Correct what was registered, while nothing is signed',
  params: IdParams,
  body: z.object({
    dateCode: z.string().trim().max(40),
    purchaseOrder: OptionalShortText,
    lotSize: z.coerce.number().int().min(1).max(10_000_000),
    version: z.number().int(),
    reason: z.string().trim().min(3, 'Say why.').max(2000),
  }),
  answer: Lot,
});
export const rejudgeLot = endpoint({
  method: 'post',
  path: '/api/lots/:id/rejudgement',
  roles: ['quality_engineer'],
  summary: 'Judge a lot by newer revisions: a signed act with a reason',
  params: IdParams,
  body: SigningFields.extend({ partRevisionId: Id, receiverRevisionIds: z.array(Id).optional() }),
  answer: Lot,
});

export const Reading = z.object({
  uploadId: Id,
  fileLine: z.number().int(),
  serial: z.string(),
  temperatureC: z.string().nullable(),
  frequencyHz: z.string(),
  offsetPpm: z.number(),
  measuredAt: z.string().nullable(),
  verdict: z.enum(['conforming', 'not_proven', 'nonconforming']).nullable(),
});
export const ReadingFilter = z.object({
  serial: z.string().max(200).optional(),
  uploadId: Id.optional(),
  beyond: z.enum(['limits', 'allowance']).optional(),
});
export const listReadings = endpoint({
  method: 'get',
  path: '/api/lots/:id/readings',
  roles: houseRoles,
  summary: 'Readings of a lot',
  params: IdParams,
  query: ListQuery.extend(ReadingFilter.shape),
  answer: listOf(Reading),
});
export const exportReadings = endpoint({
  method: 'get',
  path: '/api/lots/:id/readings.csv',
  roles: houseRoles,
  summary: 'Readings of a lot as CSV; uploads again as is',
  params: IdParams,
  query: ReadingFilter,
  produces: 'text/csv',
});
