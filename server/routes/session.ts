import * as contract from '@shared/contract/session';
import { currentPerson } from '../http/current-person';
import { route } from '../http/route';
import { clearSessionCookie } from '../http/sessions';
import { renewSession, signInRequest } from '../http/sign-in-request';
import { presentLink } from '../presenters/link';
import { presentSession } from '../presenters/open-session';
import { findLink } from '../services/links/find-link';
import { requestReset } from '../services/links/request-reset';
import { useLink } from '../services/links/use-link';
import { setMailChoice } from '../services/preferences/mail-choice';
import { endOwnSession, signOut } from '../services/sessions/end-session';
import { storedSessions } from '../services/sessions/list-sessions';
import { changePassword } from '../services/sign-in/change-password';

const ok = { ok: true as const };

export const sessionRoutes = [
  route(contract.signIn, async ({ request, response }) => {
    const { id } = await signInRequest(request, response);
    return currentPerson(request, id);
  }),
  route(contract.currentSession, ({ request }) => currentPerson(request)),
  route(contract.signOut, async ({ actor, request, response }) => {
    await signOut(actor, request.sessionID);
    clearSessionCookie(response);
    return ok;
  }),
  // Any request from the desk moves the idle end; this one does nothing else.
  route(contract.extendSession, ({ request }) => currentPerson(request)),
  route(contract.listSessions, async ({ actor, request }) => ({
    items: (await storedSessions(actor.id)).map((stored) =>
      presentSession(stored, request.sessionID),
    ),
    next: null,
  })),
  route(contract.endSession, async ({ actor, params, request }) => {
    await endOwnSession(actor, request.sessionID, params.id);
    return ok;
  }),
  route(contract.changePassword, async ({ actor, body, request }) => {
    await changePassword(actor, request.sessionID, body);
    await renewSession(request);
    return ok;
  }),
  route(contract.requestReset, async ({ body, request }) => {
    await requestReset(body.email, request.ip ?? '');
    return ok;
  }),
  route(contract.readLink, async ({ params, request }) =>
    presentLink(await findLink(params.token, request.ip ?? '')),
  ),
  route(contract.useLink, async ({ params, body, request }) => {
    await useLink(params.token, body, request.ip ?? '');
    return ok;
  }),
  route(contract.setMailChoice, async ({ actor, body, request }) => {
    await setMailChoice(actor, body.mailChoice);
    return currentPerson(request);
  }),
];
