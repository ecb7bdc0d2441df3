import { QueryTypes } from 'sequelize';
import { database } from '../../database/connection';
import { act } from '../../history/act';
import { system } from '../../http/actor';
import { NotSignedIn } from '../../http/errors';
import { Person } from '../../models';
import { countAttempt, forgiveAttempt, signInCounters } from './attempts';
import { hashPassword, isOutdated, verifyPassword } from './password';

/** One answer for an unknown address, a wrong password, an invited and a disabled person. */
export class WrongSignIn extends NotSignedIn {
  constructor() {
    super('The e-mail address or the password is not right.', 'sign_in.wrong');
  }
}

export function personByEmail(email: string): Promise<Person | null> {
  return Person.findOne({
    where: Person.sequelize!.where(
      Person.sequelize!.fn('lower', Person.sequelize!.col('email')),
      email.toLowerCase(),
    ),
  });
}

/**
 * Who this is, or WrongSignIn. Every way through counts a try, looks up one person, verifies one hash and, when it
 * fails, writes one history entry: what a stranger can measure does not depend on who exists.
 */
export async function signIn(email: string, password: string, address: string): Promise<Person> {
  const counters = signInCounters(email, address);
  await countAttempt(counters);
  const person = await personByEmail(email);
  const active = person?.state === 'active';
  const right = await verifyPassword(active ? person.passwordHash : null, password);
  if (!person || !active || !right) {
    await recordRefusal(person);
    throw new WrongSignIn();
  }
  await forgiveAttempt(counters);
  await recordStart(person, password);
  return person;
}

function recordRefusal(person: Person | null): Promise<void> {
  return act(system, 'session.refuse', async (transaction) => {
    const [row] = await database().sequelize.query<{ failed_sign_ins: number }>(
      'UPDATE people SET failed_sign_ins = failed_sign_ins + 1 WHERE id = :id RETURNING failed_sign_ins',
      { replacements: { id: person?.id ?? null }, transaction, type: QueryTypes.SELECT },
    );
    return {
      result: undefined,
      entry: {
        recordType: 'person',
        // What a stranger typed is not kept: it may be a password in the wrong field.
        recordId: person?.id ?? 'unknown',
        after: person
          ? {
              refused: person.state === 'active' ? 'wrong password' : person.state,
              inARow: row?.failed_sign_ins ?? 0,
            }
          : { refused: 'unknown address' },
      },
    };
  });
}

async function recordStart(person: Person, password: string): Promise<void> {
  const renewed =
    person.passwordHash && isOutdated(person.passwordHash) ? await hashPassword(password) : null;
  const actor = {
    kind: 'person' as const,
    id: person.id,
    name: person.name,
    role: person.role,
    supplierId: person.supplierId,
    address: '',
  };
  await act(actor, 'session.start', async (transaction) => {
    await Person.update(
      {
        failedSignIns: 0,
        lastSignInAt: new Date(),
        ...(renewed ? { passwordHash: renewed } : {}),
      },
      { where: { id: person.id }, transaction },
    );
    return { result: undefined, entry: { recordType: 'person', recordId: person.id } };
  });
}
