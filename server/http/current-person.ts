import { type Request } from 'express';
import { Person } from '../models';
import { presentCurrentPerson } from '../presenters/session';
import { NotSignedIn } from './errors';
import { endOfSession } from './session-clock';

/** The person of the session as the contract shows them. */
export async function currentPerson(request: Request, id = request.user?.id) {
  const person = id ? await Person.findByPk(id, { include: ['supplier'] }) : null;
  if (!person) throw new NotSignedIn();
  return presentCurrentPerson(person, endOfSession(request));
}
