import * as contract from '@shared/contract/people';
import { route } from '../http/route';
import { changePerson } from '../services/people/change-person';
import { disablePerson, enablePerson } from '../services/people/disable-person';
import { endPersonSessions, sendLink, unlockPerson } from '../services/people/help-person';
import { invitePerson } from '../services/people/invite-person';
import { readPeople, readPerson } from '../services/people/read-people';

export const peopleRoutes = [
  route(contract.listPeople, ({ query }) => readPeople(query)),
  route(contract.invitePerson, async ({ actor, body }) =>
    readPerson(await invitePerson(actor, body)),
  ),
  route(contract.readPerson, ({ params }) => readPerson(params.id)),
  route(contract.changePerson, async ({ actor, params, body }) => {
    await changePerson(actor, params.id, body);
    return readPerson(params.id);
  }),
  route(contract.disablePerson, async ({ actor, params, body }) => {
    await disablePerson(actor, params.id, body.reason);
    return readPerson(params.id);
  }),
  route(contract.enablePerson, async ({ actor, params }) => {
    await enablePerson(actor, params.id);
    return readPerson(params.id);
  }),
  route(contract.sendLink, async ({ actor, params }) => {
    await sendLink(actor, params.id);
    return readPerson(params.id);
  }),
  route(contract.unlockPerson, async ({ actor, params }) => {
    await unlockPerson(actor, params.id);
    return readPerson(params.id);
  }),
  route(contract.endPersonSessions, async ({ actor, params }) => {
    await endPersonSessions(actor, params.id);
    return { ok: true as const };
  }),
];
