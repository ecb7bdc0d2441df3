import { Op } from 'sequelize';
import { decodeCursor, page } from '../../database/keyset';
import { HistoryCheckpoint } from '../../models';
import { presentCheckpoint } from '../../presenters/checkpoint';

/** Newest first. */
export async function readCheckpoints(limit: number, after?: string) {
  const where = after ? { at: { [Op.lt]: new Date(String(decodeCursor(after, 1)[0])) } } : {};
  const rows = await HistoryCheckpoint.findAll({
    where,
    order: [['at', 'DESC']],
    limit: limit + 1,
  });
  return page(rows, limit, presentCheckpoint, (row) => [row.at.toISOString()]);
}
