import { z } from 'zod';
import { endpoint } from './endpoint';
import {
  Id,
  IdParams,
  ListQuery,
  OptionalLongText,
  OptionalShortText,
  PositiveDecimalText,
  ShortText,
  houseRoles,
  listOf,
} from './common';
import { ApproveRevision, RevisionHead, RevisionName } from './revisions';

export const ReceiverCriteria = z.object({
  carrierHz: PositiveDecimalText,
  symbolRateHz: PositiveDecimalText,
  pulse: z.enum(['root_raised_cosine', 'rectangular']),
  /** 0 to 1 for root-raised-cosine; null for rectangular pulses. */
  rollOff: z.number().min(0).max(1).nullable(),
  /** Two-sided, at radio frequency. */
  frontEndBandwidthHz: PositiveDecimalText,
  /** Largest offset, as a share of the symbol rate, for one sample per symbol behind a fixed matched filter. Common practice: 0.15. */
  shareOfSymbolRate: z.number().positive().max(0.5).default(0.15),
  farEndTolerancePpm: z.number().min(0).max(1000),
  farEndModel: z.enum(['uniform', 'normal']).default('uniform'),
  greatestSpeedMps: z.number().min(0).max(12000).default(0),
  serviceLifeYears: z.number().min(0).max(50).default(10),
  /** Share of links that may leave the symbol-rate region, 0 to 1. */
  allowedShareBeyond: z.number().min(0).max(1).default(0.01),
  /** Id of the published air interface it was started from, and what that source says. */
  airInterfaceId: z.string().max(100).nullable().default(null),
});
export type ReceiverCriteria = z.infer<typeof ReceiverCriteria>;
export const ReceiverCriteriaFields = ReceiverCriteria.superRefine((c, context) => {
  if (c.pulse === 'root_raised_cosine' && c.rollOff === null)
    context.addIssue({
      code: 'custom',
      path: ['rollOff'],
      message: 'A root-raised-cosine pulse has a roll-off from 0 to 1.',
      input: c,
    });
});

export const ReceiverRevision = RevisionHead.extend({ receiverId: Id, criteria: ReceiverCriteria });
export type ReceiverRevision = z.infer<typeof ReceiverRevision>;

export const Receiver = z.object({
  id: Id,
  name: z.string(),
  description: z.string(),
  active: z.boolean(),
  revision: ReceiverRevision.nullable(),
  /** Derived from the revision: total allowance between both ends, and what is left for our unit. */
  allowance: z
    .object({ totalHz: z.number(), totalPpm: z.number(), forUnitPpm: z.number() })
    .nullable(),
  parts: z.array(z.object({ id: Id, partNumber: z.string() })),
  version: z.number().int(),
});
export type Receiver = z.infer<typeof Receiver>;
export const ReceiverWithRevisions = Receiver.extend({ revisions: z.array(ReceiverRevision) });
export type ReceiverWithRevisions = z.infer<typeof ReceiverWithRevisions>;

const ReceiverFields = z.object({
  name: ShortText,
  description: OptionalShortText,
  active: z.boolean().default(true),
  partIds: z.array(Id).max(200).optional(),
});
const RevisionFields = z.object({
  revision: RevisionName,
  changeNote: OptionalLongText,
  criteria: ReceiverCriteriaFields,
});
const RevisionParams = z.object({ id: Id, revisionId: Id });

export const listReceivers = endpoint({
  method: 'get',
  path: '/api/receivers',
  roles: houseRoles,
  summary: 'Receivers',
  query: ListQuery.extend({ find: z.string().max(200).optional() }),
  answer: listOf(Receiver),
});
export const addReceiver = endpoint({
  method: 'post',
  path: '/api/receivers',
  roles: ['administrator'],
  summary: 'Add a receiver with its first revision as a draft',
  body: ReceiverFields.extend({
    revision: RevisionName.default('A'),
    changeNote: OptionalLongText,
    criteria: ReceiverCriteriaFields,
  }),
  answer: ReceiverWithRevisions,
  status: 201,
});
export const readReceiver = endpoint({
  method: 'get',
  path: '/api/receivers/:id',
  roles: houseRoles,
  summary: 'A receiver with its revisions',
  params: IdParams,
  answer: ReceiverWithRevisions,
});
export const changeReceiver = endpoint({
  method: 'put',
  path: '/api/receivers/:id',
  roles: ['administrator'],
  summary: 'Change what a receiver is called and which parts it uses',
  params: IdParams,
  body: ReceiverFields.extend({ version: z.number().int() }),
  answer: ReceiverWithRevisions,
});
export const addReceiverRevision = endpoint({
  method: 'post',
  path: '/api/receivers/:id/revisions',
  roles: ['administrator'],
  summary: 'Draft a new revision',
  params: IdParams,
  body: RevisionFields,
  answer: ReceiverWithRevisions,
  status: 201,
});
export const changeReceiverRevision = endpoint({
  method: 'put',
  path: '/api/receivers/:id/revisions/:revisionId',
  roles: ['administrator'],
  summary: 'Change a draft revision',
  params: RevisionParams,
  body: RevisionFields.extend({ version: z.number().int() }),
  answer: ReceiverWithRevisions,
});
export const approveReceiverRevision = endpoint({
  method: 'post',
  path: '/api/receivers/:id/revisions/:revisionId/approval',
  roles: ['quality_engineer'],
  summary: 'Approve a revision with a signature',
  params: RevisionParams,
  body: ApproveRevision,
  answer: ReceiverWithRevisions,
});
