import { type Transaction } from 'sequelize';
import { NotFound } from '../../http/errors';
import { Bench, Lot, Person, Upload } from '../../models';

export const uploadInclude = [
  { model: Lot, as: 'lot', attributes: ['id', 'lotNumber', 'state', 'supplierId'] },
  { model: Bench, as: 'bench', attributes: ['id', 'name'] },
  { model: Person, as: 'uploader', attributes: ['id', 'name'] },
];

/** Everybody of the house may read every upload; the contract keeps supplier contacts out altogether. */
export async function findUpload(id: string, transaction?: Transaction): Promise<Upload> {
  const upload = await Upload.findByPk(id, { include: uploadInclude, transaction });
  if (!upload) throw new NotFound('This upload');
  return upload;
}
