import { QueryTypes, type Transaction } from 'sequelize';
import { z } from 'zod';
import { database } from '../../database/connection';
import { act, type Entry } from '../../history/act';
import { system, type Actor } from '../../http/actor';
import { Conflict, InvalidInput } from '../../http/errors';
import { Person } from '../../models';
import { deleteSessions } from '../sessions/end-session';
import { forgiveAccount } from '../sign-in/attempts';
import { tellPasswordChanged } from '../sign-in/change-password';
import { newPasswordHash } from '../sign-in/new-password';
import { findLink, type LiveLink } from './find-link';
import { killLinks } from './issue-link';

export interface LinkUse {
  newPassword: string;
  name?: string;
  email?: string;
}

/** Sets a password by a mailed link. The link is spent in the same transaction, so that it works once and never half. */
export async function useLink(token: string, use: LinkUse, address: string): Promise<void> {
  const found = await findLink(token, address);
  // The slow hash comes before the row is locked; the link is looked at again under the lock.
  if (found.person) await setPassword(token, use, address, found.person);
  else await makeFirstAdministrator(token, use, address);
}

async function spend(transaction: Transaction, { link }: LiveLink): Promise<void> {
  await link.update({ usedAt: new Date() }, { transaction });
}

async function setPassword(token: string, use: LinkUse, address: string, known: Person) {
  const passwordHash = await newPasswordHash(use.newPassword, [known.name, known.email]);
  await act(self(known), 'password.set_by_link', async (transaction) => {
    const live = await findLink(token, address, transaction);
    const person = live.person!;
    const before = person.state;
    await spend(transaction, live);
    await killLinks(transaction, person.id);
    await person.update(
      {
        passwordHash,
        state: 'active',
        sessionEpoch: person.sessionEpoch + 1,
        failedSignIns: 0,
        failedSignings: 0,
        version: person.version + 1,
      },
      { transaction },
    );
    await deleteSessions(transaction, person.id);
    if (before === 'active') await tellPasswordChanged(transaction, person.id);
    return {
      result: undefined,
      entry: {
        recordType: 'person',
        recordId: person.id,
        before: { state: before },
        after: { state: 'active', by: live.link.purpose },
      },
    };
  });
  // The owner of the mailbox has proved who they are: guesses of others no longer hold them up.
  await forgiveAccount(known.email);
}

function self(person: Person): Actor {
  const { id, name, role, supplierId } = person;
  return { kind: 'person', id, name, role, supplierId, address: '' };
}

async function makeFirstAdministrator(token: string, use: LinkUse, address: string) {
  const name = use.name ?? '';
  const email = use.email ?? '';
  const fields: Record<string, string> = {};
  if (name === '') fields.name = 'Your name is needed; it stands beside what you sign.';
  if (!z.email().safeParse(email).success)
    fields.email = 'Write an e-mail address, such as name@example.com.';
  if (Object.keys(fields).length > 0)
    throw new InvalidInput('Your name and e-mail address are needed.', fields);
  const passwordHash = await newPasswordHash(use.newPassword, [name, email]);
  await act(system, 'first_administrator.make', async (transaction) => {
    const live = await findLink(token, address, transaction);
    await refuseUnlessEmpty(transaction);
    await spend(transaction, live);
    const person = await Person.create(
      { name, email, role: 'administrator', passwordHash, state: 'active' },
      { transaction },
    );
    const entry: Entry = {
      recordType: 'person',
      recordId: person.id,
      after: { role: 'administrator', state: 'active' },
      personal: { after: { name, email } },
    };
    return { result: undefined, entry };
  });
}

async function refuseUnlessEmpty(transaction: Transaction): Promise<void> {
  const [row] = await database().sequelize.query<{ count: string }>('SELECT count(*) FROM people', {
    transaction,
    type: QueryTypes.SELECT,
  });
  if (Number(row!.count) > 0)
    throw new Conflict(
      'first_administrator.exists',
      'There are people already. Ask an administrator for an invitation.',
    );
}
