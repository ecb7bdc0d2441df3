import { act } from '../../history/act';
import { type Actor } from '../../http/actor';
import { Conflict } from '../../http/errors';
import { mailLink } from '../links/mail-link';
import { deleteSessions } from '../sessions/end-session';
import { forgiveAccount } from '../sign-in/attempts';
import { lockPerson } from './find-person';

/** Act `person.send_link`: a new invitation or reset link by mail; the administrator never sees it. */
export function sendLink(actor: Actor, id: string): Promise<void> {
  return act(actor, 'person.send_link', async (transaction) => {
    const person = await lockPerson(transaction, id);
    if (person.state === 'disabled')
      throw new Conflict('person.disabled', 'This person is disabled. Enable the account first.');
    const purpose = await mailLink(transaction, person, 'by an administrator');
    return {
      result: undefined,
      entry: { recordType: 'person', recordId: id, after: { purpose } },
    };
  });
}

/** Act `person.unlock`: ends the waits on sign-in to this account and on signing. */
export async function unlockPerson(actor: Actor, id: string): Promise<void> {
  const email = await act(actor, 'person.unlock', async (transaction) => {
    const person = await lockPerson(transaction, id);
    const before = { signingLockedUntil: person.signingLockedUntil };
    await person.update(
      { failedSignIns: 0, failedSignings: 0, signingLockedUntil: null },
      { transaction },
    );
    return {
      result: person.email,
      entry: { recordType: 'person', recordId: id, before, after: { signingLockedUntil: null } },
    };
  });
  await forgiveAccount(email);
}

/** Act `person.end_sessions` */
export function endPersonSessions(actor: Actor, id: string): Promise<void> {
  return act(actor, 'person.end_sessions', async (transaction) => {
    const person = await lockPerson(transaction, id);
    await person.update({ sessionEpoch: person.sessionEpoch + 1 }, { transaction });
    const count = await deleteSessions(transaction, id);
    return {
      result: undefined,
      entry: { recordType: 'person', recordId: id, after: { sessionsEnded: count } },
    };
  });
}
