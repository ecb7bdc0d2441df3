import { type Transaction } from 'sequelize';
import { type Hold, type Lot, type Supplier } from '../../models';
import { queueMail, type QueuedMail } from '../../mail/outbox';
import { activeContacts, activeQualityEngineers } from './recipients';

/** A hold with what its mails need to name it. */
export interface HoldInContext {
  hold: Hold;
  lot: Lot;
  supplier: Supplier;
}

type Words = Pick<QueuedMail, 'kind' | 'subject' | 'paragraphs' | 'facts' | 'urgency' | 'strip'> & {
  linkLabel: string;
};

/** One mail to each active contact of the supplier; returns how many. */
export async function tellSupplier(
  transaction: Transaction,
  context: HoldInContext,
  words: Words,
): Promise<number> {
  const people = await activeContacts(transaction, context.hold.supplierId);
  const why = `You get this mail because you are a contact of ${context.supplier.name} for lots on hold.`;
  for (const person of people) await queueMail(transaction, mailOf(person.id, context, words, why));
  return people.length;
}

/** One mail to each active quality engineer. */
export async function tellHouse(
  transaction: Transaction,
  context: HoldInContext,
  words: Words,
): Promise<number> {
  const people = await activeQualityEngineers(transaction);
  const why = 'You get this mail because quality engineers hear of every hold.';
  for (const person of people) await queueMail(transaction, mailOf(person.id, context, words, why));
  return people.length;
}

function mailOf(personId: string, context: HoldInContext, words: Words, why: string): QueuedMail {
  const { hold, lot } = context;
  const { linkLabel, ...rest } = words;
  return {
    ...rest,
    personId,
    why,
    link: { label: linkLabel, url: `/holds/${hold.id}` },
    holdId: hold.id,
    lotId: lot.id,
  };
}
