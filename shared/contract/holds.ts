import { z } from 'zod';
import { endpoint } from './endpoint';
import { Id, IdParams, Instant, ListQuery, LongText, OptionalLongText, listOf } from './common';
import { BandStripView, LotState } from './lots';

const readers = [
  'technician',
  'quality_engineer',
  'auditor',
  'administrator',
  'supplier_contact',
] as const;

export const HoldState = z.enum(['open', 'acknowledged', 'answered', 'closed']);
export const Attachment = z.object({
  id: Id,
  fileName: z.string(),
  mediaType: z.string(),
  byteCount: z.number().int(),
  sha256: z.string(),
});
export const HoldMessage = z.object({
  id: Id,
  kind: z.enum(['notice', 'acknowledgement', 'answer', 'question', 'reply', 'reminder', 'closing']),
  author: z.object({ name: z.string(), side: z.enum(['house', 'supplier', 'system']) }),
  text: z.string(),
  containment: z.string(),
  cause: z.string(),
  correctiveAction: z.string(),
  attachments: z.array(Attachment),
  at: Instant,
});
export const HoldRow = z.object({
  id: Id,
  number: z.string(),
  state: HoldState,
  lot: z.object({
    id: Id,
    lotNumber: z.string(),
    state: LotState,
    lotSize: z.number().int(),
    dateCode: z.string(),
    purchaseOrder: z.string(),
  }),
  part: z.object({ partNumber: z.string() }),
  supplier: z.object({ id: Id, name: z.string() }),
  openedAt: Instant,
  acknowledgementDueAt: Instant,
  answerDueAt: Instant,
  acknowledgedAt: Instant.nullable(),
  answeredAt: Instant.nullable(),
  closedAt: Instant.nullable(),
  overdue: z.boolean(),
  bandStrip: BandStripView.nullable(),
  next: z.object({ text: z.string(), mine: z.boolean() }),
});
export type HoldRow = z.infer<typeof HoldRow>;
export const Hold = HoldRow.extend({
  reason: z.string(),
  finding: z.array(z.string()),
  messages: z.array(HoldMessage),
  may: z.object({
    acknowledge: z.boolean(),
    answer: z.boolean(),
    ask: z.boolean(),
    reply: z.boolean(),
  }),
  version: z.number().int(),
});
export type Hold = z.infer<typeof Hold>;

export const listHolds = endpoint({
  method: 'get',
  path: '/api/holds',
  roles: readers,
  summary: 'Holds; a supplier contact sees only those of the own supplier',
  query: ListQuery.extend({
    state: z.enum(['open', 'acknowledged', 'answered', 'closed', 'not_closed']).optional(),
    find: z.string().max(200).optional(),
  }),
  answer: listOf(HoldRow),
});
export const readHold = endpoint({
  method: 'get',
  path: '/api/holds/:id',
  roles: readers,
  params: IdParams,
  summary: 'A hold with its conversation',
  answer: Hold,
});
export const acknowledgeHold = endpoint({
  method: 'post',
  path: '/api/holds/:id/acknowledgement',
  roles: ['supplier_contact'],
  params: IdParams,
  summary: 'Acknowledge a hold notice',
  body: z.object({ note: OptionalLongText }),
  answer: Hold,
  status: 201,
});
export const answerHold = endpoint({
  method: 'post',
  path: '/api/holds/:id/answers',
  roles: ['supplier_contact'],
  params: IdParams,
  summary: 'Answer with containment, cause, corrective action and files; multipart or JSON',
  files: ['files'],
  body: z.object({
    containment: LongText,
    cause: LongText,
    correctiveAction: LongText,
    text: OptionalLongText,
  }),
  answer: Hold,
  status: 201,
});
export const askHold = endpoint({
  method: 'post',
  path: '/api/holds/:id/messages',
  roles: ['quality_engineer', 'supplier_contact'],
  params: IdParams,
  summary: 'A question or a reply; multipart or JSON',
  files: ['files'],
  body: z.object({ text: LongText }),
  answer: Hold,
  status: 201,
});
export const downloadAttachment = endpoint({
  method: 'get',
  path: '/api/holds/:id/attachments/:attachmentId',
  roles: readers,
  params: z.object({ id: Id, attachmentId: Id }),
  summary: 'An evidence file, as an attachment',
  produces: 'application/octet-stream',
});
