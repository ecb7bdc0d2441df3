import { act } from '../../history/act';
import { type Actor } from '../../http/actor';
import { ActionError, NotSignedIn } from '../../http/errors';
import { queueMail } from '../../mail/outbox';
import { Person } from '../../models';
import { killLinks } from '../links/issue-link';
import { deleteSessions } from '../sessions/end-session';
import { countAttempt, forgiveAttempt, signInCounters } from './attempts';
import { newPasswordHash } from './new-password';
import { verifyPassword } from './password';

export class WrongCurrentPassword extends ActionError {
  constructor() {
    const text = 'This is not your current password. Nothing was changed.';
    super(403, 'password.wrong_current', text, { currentPassword: text });
  }
}

/**
 * Act `password.change`: needs the current password, which is slowed like a sign-in. Ends the other sessions if asked
 * to; the owner is told by mail.
 */
export async function changePassword(
  actor: Actor,
  sid: string,
  change: { currentPassword: string; newPassword: string; endOtherSessions: boolean },
): Promise<void> {
  const person = await Person.findByPk(actor.id);
  if (!person) throw new NotSignedIn();
  const counters = signInCounters(person.email, actor.address);
  await countAttempt(counters);
  if (!(await verifyPassword(person.passwordHash, change.currentPassword)))
    throw new WrongCurrentPassword();
  await forgiveAttempt(counters);
  const passwordHash = await newPasswordHash(change.newPassword, [person.name, person.email]);
  await act(actor, 'password.change', async (transaction) => {
    await Person.update({ passwordHash }, { where: { id: person.id }, transaction });
    await killLinks(transaction, person.id);
    const ended = change.endOtherSessions
      ? await deleteSessions(transaction, person.id, { exceptSid: sid })
      : 0;
    await tellPasswordChanged(transaction, person.id);
    return {
      result: undefined,
      entry: { recordType: 'person', recordId: person.id, after: { sessionsEnded: ended } },
    };
  });
}

export async function tellPasswordChanged(
  transaction: Parameters<typeof queueMail>[0],
  personId: string,
): Promise<void> {
  await queueMail(transaction, {
    personId,
    kind: 'account.password_changed',
    subject: 'Your password was changed',
    paragraphs: [
      'The password of your Quartzhold account was changed just now.',
      'If this was you, nothing more is needed. If it was not, ask for a new link on the sign-in page at once and tell your administrator.',
    ],
    why: 'You get this because it is your account.',
    urgency: 'at_once',
  });
}
