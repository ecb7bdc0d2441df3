import { Op, type Transaction } from 'sequelize';
import { sha256Hex } from '../../history/canonical';
import { InvalidInput } from '../../http/errors';
import { Person, PersonLink } from '../../models';
import { countAttempt } from '../sign-in/attempts';

/** 400, the same for links that never were, were used, ran out or were replaced. */
export class DeadLink extends InvalidInput {
  constructor() {
    super(
      'This link no longer works. It may have been used, replaced by a newer one, or run out. Ask for a new one.',
      undefined,
      'link.dead',
    );
  }
}

export interface LiveLink {
  link: PersonLink;
  /** Null for the first administrator. */
  person: Person | null;
}

/** A link that works now, with its person; locked for the rest of a transaction if one is given. */
export async function findLink(
  token: string,
  address: string,
  transaction?: Transaction,
): Promise<LiveLink> {
  if (!transaction) await countAttempt([{ brake: 'link', subject: [address] }]);
  const link = await PersonLink.findOne({
    where: { tokenHash: sha256Hex(token), usedAt: null, expiresAt: { [Op.gt]: new Date() } },
    ...(transaction ? { transaction, lock: transaction.LOCK.UPDATE } : {}),
  });
  if (!link) throw new DeadLink();
  if (link.purpose === 'first_administrator') return { link, person: null };
  const person = await Person.findByPk(link.personId!, { transaction });
  if (!person || person.state === 'disabled') throw new DeadLink();
  return { link, person };
}
