import { type Transaction } from 'sequelize';
import { act } from '../../history/act';
import { type Actor } from '../../http/actor';
import { Conflict, InvalidInput, NotFound } from '../../http/errors';
import { ConcessionFile, Disposition } from '../../models';
import { mayAddApproval } from '../../policies/dispositions';
import { checkEvidence, greatestFileCount, type EvidenceFile } from '../holds/keep-evidence';
import { lockLot } from '../lots/find-lot';

/** Act `disposition.customer_approval`: what the customer sent to approve a concession is kept with it. */
export async function addCustomerApproval(
  actor: Actor,
  id: string,
  files: EvidenceFile[],
): Promise<void> {
  await act(actor, 'disposition.customer_approval', async (transaction) => {
    const found = await Disposition.findByPk(id, { attributes: ['lotId'], transaction });
    if (!found) throw new NotFound('This decision');
    const lot = await lockLot(found.lotId, transaction);
    const disposition = (await Disposition.findByPk(id, { transaction }))!;
    if (!mayAddApproval(actor, disposition))
      throw new Conflict(
        'disposition.no_concession',
        'A customer’s approval is kept only with a concession that waits for its second signature or is in force.',
      );
    if (files.length === 0)
      throw new InvalidInput('Choose the file that the customer sent.', {
        files: 'Choose the file that the customer sent.',
      });
    const checked = checkEvidence(files);
    const kept = await ConcessionFile.count({ where: { dispositionId: id }, transaction });
    if (kept + checked.length > greatestFileCount)
      throw new InvalidInput(
        `A concession keeps at most ${greatestFileCount} files; it has ${kept}.`,
        { files: `At most ${greatestFileCount} files.` },
        'attachment.too_many',
      );
    const added: { id: string; fileName: string; sha256: string }[] = [];
    // One by one: a bulk insert writes the bytes as text into one statement.
    for (const { fileName, mediaType, bytes, sha256 } of checked) {
      const file = await ConcessionFile.create(
        {
          dispositionId: id,
          fileName,
          mediaType,
          byteCount: bytes.length,
          sha256,
          bytes,
          sentBy: actor.id,
        },
        { transaction },
      );
      added.push({ id: file.id, fileName, sha256 });
    }
    return {
      result: undefined,
      entry: {
        recordType: 'disposition',
        recordId: id,
        lotId: lot.id,
        after: { customerApproval: added },
      },
    };
  });
}

/** What the second signer has before the eyes, to be bound by the signature. */
export async function approvalsSeen(transaction: Transaction, dispositionId: string) {
  const files = await ConcessionFile.findAll({
    attributes: ['fileName', 'sha256'],
    where: { dispositionId },
    order: ['sentAt', 'id'],
    transaction,
  });
  return files.map(({ fileName, sha256 }) => ({ fileName, sha256 }));
}

export async function readCustomerApproval(dispositionId: string, fileId: string) {
  const file = await ConcessionFile.findOne({ where: { id: fileId, dispositionId } });
  if (!file) throw new NotFound('This file');
  return file;
}
