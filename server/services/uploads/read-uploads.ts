import { Op } from 'sequelize';
import { decodeCursor, page } from '../../database/keyset';
import { Upload } from '../../models';
import { presentUpload } from '../../presenters/uploads';
import { uploadInclude } from './find-upload';

/** Uploads of a lot, newest first. */
export async function listUploads(lotId: string, query: { after?: string; limit: number }) {
  const before = query.after ? Number(decodeCursor(query.after, 1)[0]) : null;
  const rows = await Upload.findAll({
    where: { lotId, ...(before === null ? {} : { number: { [Op.lt]: before } }) },
    include: uploadInclude,
    order: [['number', 'DESC']],
    limit: query.limit + 1,
  });
  return page(rows, query.limit, presentUpload, (row) => [row.number]);
}
