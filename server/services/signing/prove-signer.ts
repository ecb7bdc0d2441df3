import { record } from '../../history/act';
import { inTransaction } from '../../database/connection';
import { type Actor } from '../../http/actor';
import { ActionError, NotAllowed, TooMany } from '../../http/errors';
import { queueMail } from '../../mail/outbox';
import { Person } from '../../models';
import { verifyPassword } from '../sign-in/password';

const failuresToLock = 5;
const lockMinutes = 15;

/** 403: the password that goes with a signature was not right; nothing was signed. */
export class WrongSigningPassword extends ActionError {
  constructor() {
    const text = 'This is not your password. Nothing was signed.';
    super(403, 'signing.wrong_password', text, { password: text });
  }
}

/**
 * Proves, before an act that is signed, that the person at the desk is the one who signed in. Five wrong passwords in
 * a row lock signing (not sign-in) for a quarter of an hour and tell the owner. Runs in a transaction of its own, so
 * that a failure stays counted though the act is undone; the row lock makes parallel guesses wait for each other.
 */
export async function proveSigner(actor: Actor, password: string): Promise<void> {
  if (actor.kind !== 'person') throw new NotAllowed('Only a person can sign.');
  const refusal = await inTransaction(async (transaction) => {
    // The key stays free: a file that this person is still sending holds on to it.
    const person = await Person.findByPk(actor.id, {
      transaction,
      lock: transaction.LOCK.NO_KEY_UPDATE,
    });
    if (!person || person.state !== 'active') return new NotAllowed();
    const now = new Date();
    if (person.signingLockedUntil && person.signingLockedUntil > now)
      return lockedUntil(person.signingLockedUntil, now);
    if (await verifyPassword(person.passwordHash, password)) {
      if (person.failedSignings > 0)
        await person.update({ failedSignings: 0, signingLockedUntil: null }, { transaction });
      return null;
    }
    const failures = person.failedSignings + 1;
    const locks = failures >= failuresToLock;
    const until = locks ? new Date(now.getTime() + lockMinutes * 60_000) : null;
    await person.update(
      { failedSignings: locks ? 0 : failures, signingLockedUntil: until },
      { transaction },
    );
    await record(transaction, actor, locks ? 'signing.lock' : 'signing.refuse', {
      recordType: 'person',
      recordId: person.id,
      after: { failures, lockedUntil: until },
    });
    if (locks) {
      await queueMail(transaction, {
        personId: person.id,
        kind: 'signing_locked',
        subject: 'Signing is locked for 15 minutes',
        paragraphs: [
          `Somebody who was signed in as you gave a wrong password ${failures} times when asked to sign. Signing in your name is locked for ${lockMinutes} minutes.`,
          'If this was you, wait and try again. If it was not, change your password now and tell your administrator.',
        ],
        why: 'You get this because your account is the one that was used.',
        urgency: 'at_once',
      });
    }
    return locks ? lockedUntil(until!, now) : new WrongSigningPassword();
  });
  if (refusal) throw refusal;
}

function lockedUntil(until: Date, now: Date): TooMany {
  const seconds = Math.max(1, Math.ceil((until.getTime() - now.getTime()) / 1000));
  return new TooMany(
    `Signing is locked for ${Math.ceil(seconds / 60)} more min after ${failuresToLock} wrong passwords. Nothing was signed.`,
    seconds,
    'signing.locked',
  );
}
