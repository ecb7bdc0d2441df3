import { Op, type WhereOptions } from 'sequelize';
import { type QueryOf } from '@shared/contract/endpoint';
import { type listMail } from '@shared/contract/mail';
import { likePattern, page } from '../../database/keyset';
import { timeCursor } from '../../database/time-cursor';
import { NotFound } from '../../http/errors';
import { Mail } from '../../models';
import { presentMail, presentMailRow } from '../../presenters/mail';

/** Outgoing mail, newest first. Bodies stay in the table: a list of them would be megabytes. */
export async function readMails(query: QueryOf<typeof listMail>) {
  const where: WhereOptions[] = [];
  if (query.state) where.push({ state: query.state });
  if (query.find) {
    const like = { [Op.iLike]: likePattern(query.find) };
    where.push({
      [Op.or]: [{ subject: like }, { toName: like }, { toEmail: like }, { messageId: like }],
    });
  }
  if (query.after) {
    const { at, id } = timeCursor(query.after);
    where.push({
      [Op.or]: [{ createdAt: { [Op.lt]: at } }, { createdAt: at, id: { [Op.gt]: id } }],
    });
  }
  const mails = await Mail.findAll({
    attributes: { exclude: ['textBody', 'htmlBody', 'pictures'] },
    where: { [Op.and]: where },
    order: [
      ['createdAt', 'DESC'],
      ['id', 'ASC'],
    ],
    limit: query.limit + 1,
  });
  return page(mails, query.limit, presentMailRow, (mail) => [
    mail.createdAt.toISOString(),
    mail.id,
  ]);
}

export async function readMail(id: string) {
  const mail = await Mail.findByPk(id);
  if (!mail) throw new NotFound('This mail');
  return presentMail(mail);
}
