import { act } from '../../history/act';
import { type Actor } from '../../http/actor';
import { Conflict, NotFound } from '../../http/errors';
import { Lot, Upload } from '../../models';
import { mayClearWarnings } from '../../policies/uploads';

/** A quality engineer answers for the warnings of a file; from then on they stand in the way of nothing. */
export function clearWarnings(actor: Actor, id: string, reason: string): Promise<void> {
  return act(actor, 'upload.clear_warnings', async (transaction) => {
    const upload = await Upload.findByPk(id, { transaction, lock: transaction.LOCK.UPDATE });
    if (!upload) throw new NotFound('This upload');
    const lot = (await Lot.findByPk(upload.lotId, { transaction }))!;
    const facts = { state: upload.state, uploadedBy: upload.uploadedBy, lotState: lot.state };
    if (!mayClearWarnings(actor, facts))
      throw new Conflict(
        'upload.not_clearable',
        'Warnings are cleared once a file has been read, and only while it counts.',
      );
    const open = upload.warnings.filter((warning) => !warning.cleared);
    if (open.length === 0)
      throw new Conflict('upload.no_warnings', 'This upload has no open warnings.');
    await upload.update(
      { warnings: upload.warnings.map((warning) => ({ ...warning, cleared: true })) },
      { transaction },
    );
    return {
      result: undefined,
      entry: {
        recordType: 'upload',
        recordId: id,
        lotId: upload.lotId,
        before: { openWarnings: open.map((warning) => warning.code) },
        after: { openWarnings: [] },
        reason,
      },
    };
  });
}
