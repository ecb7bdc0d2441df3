import { type Transaction } from 'sequelize';
import { type BodyOf } from '@shared/contract/endpoint';
import { type changePerson as contract } from '@shared/contract/people';
import { act } from '../../history/act';
import { type Actor } from '../../http/actor';
import { Conflict } from '../../http/errors';
import { queueMail } from '../../mail/outbox';
import { type Person } from '../../models';
import { whyNotRole } from '../../policies/people';
import { killLinks } from '../links/issue-link';
import {
  countActiveAdministrators,
  lockPerson,
  refuseTakenEmail,
  refuseUnknownSupplier,
} from './find-person';

type Change = BodyOf<typeof contract>;

/** Act `person.change`. Role and supplier count from the person's next request; a new address is told to the old one too. */
export function changePerson(actor: Actor, id: string, input: Change): Promise<void> {
  return act(actor, 'person.change', async (transaction) => {
    const administrators = await countActiveAdministrators(transaction);
    const person = await lockPerson(transaction, id, input.version);
    const { name, email, role, supplierId } = input;
    const refusal = whyNotRole(actor.id, person, role, administrators);
    if (refusal) throw new Conflict('person.role', refusal, { role: refusal });
    await refuseTakenEmail(transaction, email, id);
    await refuseUnknownSupplier(transaction, supplierId);
    const before = {
      role: person.role,
      supplierId: person.supplierId,
      name: person.name,
      email: person.email,
    };
    if (email.toLowerCase() !== before.email.toLowerCase())
      await moveAddress(transaction, person, email);
    await person.update(
      { name, email, role, supplierId, version: input.version + 1 },
      { transaction },
    );
    return {
      result: undefined,
      entry: {
        recordType: 'person',
        recordId: id,
        before: { role: before.role, supplierId: before.supplierId },
        after: { role, supplierId },
        personal: {
          before: { name: before.name, email: before.email },
          after: { name, email },
        },
      },
    };
  });
}

/** The old mailbox hears of it before it is left behind, and links that lie in it die. */
async function moveAddress(transaction: Transaction, person: Person, email: string): Promise<void> {
  await killLinks(transaction, person.id);
  const notice = {
    personId: person.id,
    kind: 'account.address_changed',
    subject: 'The address of your account was changed',
    paragraphs: [
      'An administrator changed the e-mail address of your Quartzhold account. From now on you sign in with the new address, and mail goes there.',
      'If you did not expect this, tell your administrator.',
    ],
    why: 'You get this because it is your account; it goes to the old address and the new one.',
    urgency: 'at_once' as const,
  };
  await queueMail(transaction, notice);
  await person.update({ email }, { transaction });
  await queueMail(transaction, notice);
}
