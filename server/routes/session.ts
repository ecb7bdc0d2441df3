import * as contract from '@shared/contract/session';
import { cookieName } from '../http/sessions';
import { route } from '../http/route';
import { signInRequest } from '../http/sign-in-request';
import { config } from '../config';
import { currentPerson } from '../http/current-person';
import { signOut } from '../services/sessions/end-session';

export const sessionRoutes = [
  route(contract.signIn, async ({ request, response }) => {
    const { id } = await signInRequest(request, response);
    return currentPerson(request, id);
  }),
  route(contract.currentSession, ({ request }) => currentPerson(request)),
  route(contract.signOut, async ({ actor, request, response }) => {
    await signOut(actor, request.sessionID);
    const { secureCookies } = config();
    response.clearCookie(cookieName(config()), {
      path: '/',
      httpOnly: true,
      sameSite: 'lax',
      secure: secureCookies,
    });
    return { ok: true as const };
  }),
  route(contract.extendSession, ({ request }) => currentPerson(request)),
];
