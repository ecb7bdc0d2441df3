import { Op, type Transaction } from 'sequelize';
import { Conflict } from '../../http/errors';
import { Lot, Person, Upload } from '../../models';

/** Uploads that hold exactly these bytes and still count, newest first. */
export function uploadsOfContent(
  sha256: string,
  transaction?: Transaction,
  exceptId?: string,
): Promise<Upload[]> {
  return Upload.findAll({
    where: {
      sha256,
      state: ['queued', 'running', 'done'],
      ...(exceptId ? { id: { [Op.ne]: exceptId } } : {}),
    },
    include: [
      { model: Lot, as: 'lot', attributes: ['id', 'lotNumber'] },
      { model: Person, as: 'uploader', attributes: ['id', 'name'] },
    ],
    order: [['createdAt', 'DESC']],
    limit: 20,
    transaction,
  });
}

export function uploaderName(upload: Upload): string {
  return upload.uploader?.name ?? 'a bench';
}

export function sameFileConflict(upload: Upload): Conflict {
  return new Conflict(
    'upload.same_file',
    `This lot has this very file already: ${upload.fileName}, uploaded by ${uploaderName(upload)} at ${upload.createdAt.toISOString()}. Withdraw that upload first if it has to be read anew.`,
    { file: 'The same file was uploaded before.' },
  );
}
