import { z } from 'zod';
import { endpoint } from './endpoint';
import { Id, IdParams, Instant, ListQuery, Ok, Role, ShortText, listOf } from './common';

const who = ['administrator'] as const;

export const Person = z.object({
  id: Id,
  name: z.string(),
  email: z.string(),
  role: Role,
  supplier: z.object({ id: Id, name: z.string() }).nullable(),
  state: z.enum(['invited', 'active', 'disabled']),
  /** Of the latest invitation or reset link. */
  link: z
    .object({
      purpose: z.enum(['invitation', 'reset']),
      mailState: z.enum(['queued', 'accepted', 'refused', 'dead']),
      lastAnswer: z.string(),
      sentAt: Instant.nullable(),
      expiresAt: Instant,
      usedAt: Instant.nullable(),
    })
    .nullable(),
  lastSignInAt: Instant.nullable(),
  lockedUntil: Instant.nullable(),
  version: z.number().int(),
  createdAt: Instant,
});
export type Person = z.infer<typeof Person>;

const PersonFields = z.object({
  name: ShortText,
  email: z.email('Write an e-mail address, such as name@example.com.').max(254),
  role: Role,
  supplierId: Id.nullable().default(null),
});
function boundToSupplier(value: { role: Role; supplierId: string | null }) {
  return (value.role === 'supplier_contact') === (value.supplierId !== null);
}
export const InvitePerson = PersonFields.refine(boundToSupplier, {
  path: ['supplierId'],
  error: 'A supplier contact belongs to one supplier; nobody else does.',
});
export const ChangePerson = PersonFields.extend({ version: z.number().int() }).refine(
  boundToSupplier,
  {
    path: ['supplierId'],
    error: 'A supplier contact belongs to one supplier; nobody else does.',
  },
);

export const listPeople = endpoint({
  method: 'get',
  path: '/api/people',
  roles: who,
  summary: 'People',
  query: ListQuery.extend({ find: z.string().max(200).optional(), role: Role.optional() }),
  answer: listOf(Person),
});
export const invitePerson = endpoint({
  method: 'post',
  path: '/api/people',
  roles: who,
  summary: 'Invite a person by mail',
  body: InvitePerson,
  answer: Person,
  status: 201,
});
export const readPerson = endpoint({
  method: 'get',
  path: '/api/people/:id',
  roles: who,
  summary: 'A person',
  params: IdParams,
  answer: Person,
});
export const changePerson = endpoint({
  method: 'put',
  path: '/api/people/:id',
  roles: who,
  summary: 'Change name, address, role or supplier',
  params: IdParams,
  body: ChangePerson,
  answer: Person,
});
export const disablePerson = endpoint({
  method: 'post',
  path: '/api/people/:id/disablement',
  roles: who,
  summary: 'Disable; sessions end at once',
  params: IdParams,
  body: z.object({ reason: z.string().trim().min(3).max(2000) }),
  answer: Person,
});
export const enablePerson = endpoint({
  method: 'delete',
  path: '/api/people/:id/disablement',
  roles: who,
  summary: 'Enable again',
  params: IdParams,
  answer: Person,
});
export const sendLink = endpoint({
  method: 'post',
  path: '/api/people/:id/links',
  roles: who,
  summary: 'Send a new invitation or reset link; the old one dies',
  params: IdParams,
  answer: Person,
});
export const unlockPerson = endpoint({
  method: 'post',
  path: '/api/people/:id/unlocking',
  roles: who,
  summary: 'End the delay on sign-in or signing',
  params: IdParams,
  answer: Person,
});
export const endPersonSessions = endpoint({
  method: 'delete',
  path: '/api/people/:id/sessions',
  roles: who,
  summary: 'End all sessions of a person',
  params: IdParams,
  answer: Ok,
});
