import { z } from 'zod';
import { endpoint } from './endpoint';
import { Id, Instant, Ok, Role } from './common';

export const CurrentPerson = z.object({
  id: Id,
  name: z.string(),
  email: z.string(),
  role: Role,
  supplier: z.object({ id: Id, name: z.string() }).nullable(),
  mailChoice: z.enum(['at_once', 'daily']),
  sessionEndsAt: Instant,
});
export type CurrentPerson = z.infer<typeof CurrentPerson>;

/** 15 or more characters, any characters, never cut or folded. */
export const NewPassword = z
  .string()
  .min(15, 'Use at least 15 characters; a sentence works well.')
  .max(256, 'At most 256 characters.');

export const SignIn = z.object({
  email: z.string().trim().min(1, 'Your e-mail address is needed.').max(254),
  password: z.string().min(1, 'Your password is needed.').max(500),
});

export const signIn = endpoint({
  method: 'post',
  path: '/api/session',
  roles: 'anyone',
  summary: 'Sign in',
  body: SignIn,
  answer: CurrentPerson,
});
export const currentSession = endpoint({
  method: 'get',
  path: '/api/session',
  roles: 'signedIn',
  summary: 'Who is signed in',
  answer: CurrentPerson,
});
export const signOut = endpoint({
  method: 'delete',
  path: '/api/session',
  roles: 'signedIn',
  summary: 'Sign out',
  answer: Ok,
});
export const extendSession = endpoint({
  method: 'post',
  path: '/api/session/extension',
  roles: 'signedIn',
  summary: 'Stay signed in',
  answer: CurrentPerson,
});

export const OpenSession = z.object({
  id: z.string(),
  device: z.string(),
  address: z.string(),
  startedAt: Instant,
  lastUsedAt: Instant,
  current: z.boolean(),
});
export const listSessions = endpoint({
  method: 'get',
  path: '/api/sessions',
  roles: 'signedIn',
  summary: 'My open sessions',
  answer: z.object({ items: z.array(OpenSession), next: z.null() }),
});
export const endSession = endpoint({
  method: 'delete',
  path: '/api/sessions/:id',
  roles: 'signedIn',
  summary: 'End one of my sessions; `others` ends all but this',
  params: z.object({ id: z.string().max(200) }),
  answer: Ok,
});

export const changePassword = endpoint({
  method: 'post',
  path: '/api/password',
  roles: 'signedIn',
  summary: 'Change my password',
  body: z.object({
    currentPassword: z.string().min(1).max(500),
    newPassword: NewPassword,
    endOtherSessions: z.boolean().default(true),
  }),
  answer: Ok,
});
export const requestReset = endpoint({
  method: 'post',
  path: '/api/password/reset-requests',
  roles: 'anyone',
  summary: 'Ask for a reset link; the answer is the same whether or not the address is known',
  body: z.object({ email: z.string().trim().min(1).max(254) }),
  answer: Ok,
  status: 202,
});
export const LinkInfo = z.object({
  purpose: z.enum(['invitation', 'reset', 'first_administrator']),
  name: z.string(),
  email: z.string(),
  expiresAt: Instant,
});
export const readLink = endpoint({
  method: 'get',
  path: '/api/links/:token',
  roles: 'anyone',
  summary: 'What a mailed link is for',
  params: z.object({ token: z.string().min(20).max(200) }),
  answer: LinkInfo,
});
export const useLink = endpoint({
  method: 'post',
  path: '/api/links/:token',
  roles: 'anyone',
  summary: 'Set a password by a mailed single-use link',
  params: z.object({ token: z.string().min(20).max(200) }),
  body: z.object({
    newPassword: NewPassword,
    name: z.string().trim().max(200).optional(),
    email: z.string().trim().max(254).optional(),
  }),
  answer: Ok,
});
export const setMailChoice = endpoint({
  method: 'put',
  path: '/api/preferences/mail',
  roles: 'signedIn',
  summary: 'At once or a daily digest for what is not urgent',
  body: z.object({ mailChoice: z.enum(['at_once', 'daily']) }),
  answer: CurrentPerson,
});
