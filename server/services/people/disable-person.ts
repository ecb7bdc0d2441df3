import { act } from '../../history/act';
import { type Actor } from '../../http/actor';
import { Conflict } from '../../http/errors';
import { whyNotDisable } from '../../policies/people';
import { killLinks } from '../links/issue-link';
import { deleteSessions } from '../sessions/end-session';
import { countActiveAdministrators, lockPerson } from './find-person';

/** Act `person.disable`: sessions and links end at once; everything the person signed stays. */
export function disablePerson(actor: Actor, id: string, reason: string): Promise<void> {
  return act(actor, 'person.disable', async (transaction) => {
    const administrators = await countActiveAdministrators(transaction);
    const person = await lockPerson(transaction, id);
    const refusal = whyNotDisable(actor.id, person, administrators);
    if (refusal) throw new Conflict('person.not_disabled', refusal);
    const before = { state: person.state };
    await person.update(
      {
        state: 'disabled',
        sessionEpoch: person.sessionEpoch + 1,
        version: person.version + 1,
      },
      { transaction },
    );
    await killLinks(transaction, id);
    await deleteSessions(transaction, id);
    return {
      result: undefined,
      entry: { recordType: 'person', recordId: id, before, after: { state: 'disabled' }, reason },
    };
  });
}

/** Act `person.enable`: back to where the person was; whoever never chose a password is invited again. */
export function enablePerson(actor: Actor, id: string): Promise<void> {
  return act(actor, 'person.enable', async (transaction) => {
    const person = await lockPerson(transaction, id);
    if (person.state !== 'disabled')
      throw new Conflict('person.not_disabled', 'This person is not disabled.');
    const state = person.passwordHash === null ? 'invited' : 'active';
    await person.update({ state, version: person.version + 1 }, { transaction });
    return {
      result: undefined,
      entry: {
        recordType: 'person',
        recordId: id,
        before: { state: 'disabled' },
        after: { state },
      },
    };
  });
}
