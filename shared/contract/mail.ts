import { z } from 'zod';
import { endpoint } from './endpoint';
import { Id, IdParams, Instant, ListQuery, listOf } from './common';

const readers = ['administrator', 'quality_engineer', 'auditor'] as const;
export const MailState = z.enum(['queued', 'accepted', 'refused', 'dead']);
export const MailRow = z.object({
  id: Id,
  messageId: z.string(),
  kind: z.string(),
  to: z.object({ name: z.string(), email: z.string() }),
  subject: z.string(),
  state: MailState,
  tries: z.number().int(),
  lastAnswer: z.string(),
  createdAt: Instant,
  nextTryAt: Instant.nullable(),
  acceptedAt: Instant.nullable(),
  holdId: Id.nullable(),
  lotId: Id.nullable(),
});
export type MailRow = z.infer<typeof MailRow>;
export const Mail = MailRow.extend({
  text: z.string(),
  html: z.string(),
  why: z.string(),
  attempts: z.array(z.object({ at: Instant, accepted: z.boolean(), answer: z.string() })),
});
export const listMail = endpoint({
  method: 'get',
  path: '/api/mail',
  roles: readers,
  summary: 'Outgoing mail',
  query: ListQuery.extend({ state: MailState.optional(), find: z.string().max(200).optional() }),
  answer: listOf(MailRow),
});
export const readMail = endpoint({
  method: 'get',
  path: '/api/mail/:id',
  roles: readers,
  params: IdParams,
  summary: 'One mail; links of invitations are left out',
  answer: Mail,
});
export const resendMail = endpoint({
  method: 'post',
  path: '/api/mail/:id/resending',
  roles: ['administrator', 'quality_engineer'],
  params: IdParams,
  summary: 'Send again, even what was accepted: sent is not delivered',
  body: z.object({}),
  answer: Mail,
});
