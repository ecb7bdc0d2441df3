import { act } from '../../history/act';
import { type Actor } from '../../http/actor';
import { HoldMessage } from '../../models';
import { mayWrite, owesReply, sideOf } from '../../policies/holds';
import { lockHold, refuse } from './find-hold';
import { checkEvidence, keepEvidence, type EvidenceFile } from './keep-evidence';
import { tellHouse, tellSupplier } from './tell';

/** Act `hold.write`: a question, or a reply where the other side waits for one. */
export async function writeHoldMessage(
  actor: Actor,
  id: string,
  text: string,
  files: EvidenceFile[],
): Promise<void> {
  const side = sideOf(actor);
  await act(actor, 'hold.write', async (transaction) => {
    const context = await lockHold(transaction, actor, id);
    const { hold, lot, supplier } = context;
    if (!mayWrite(actor, hold)) refuse(hold, 'write');
    const checked = checkEvidence(files);
    const turns = await HoldMessage.findAll({
      attributes: ['kind', 'side'],
      where: { holdId: id },
      order: [
        ['createdAt', 'ASC'],
        ['id', 'ASC'],
      ],
      transaction,
    });
    const kind = owesReply(turns, side) ? 'reply' : 'question';
    await hold.update({ version: hold.version + 1 }, { transaction });
    const message = await HoldMessage.create(
      { holdId: id, kind, authorId: actor.id, side, text },
      { transaction },
    );
    const attachments = await keepEvidence(transaction, actor, message.id, checked);
    const who = side === 'house' ? 'Quality engineering' : supplier.name;
    const words = {
      kind: `hold.${kind}`,
      subject: `${hold.number}: ${kind === 'reply' ? 'a reply' : 'a question'}`,
      paragraphs: [`${who} ${kind === 'reply' ? 'replied' : 'asks'}:`, text],
      facts: [['Lot', lot.lotNumber]] as [string, string][],
      linkLabel: 'Read and reply',
    };
    await (side === 'house' ? tellSupplier : tellHouse)(transaction, context, words);
    return {
      result: undefined,
      entry: {
        recordType: 'hold',
        recordId: id,
        lotId: lot.id,
        after: { messageId: message.id, kind, text, attachments },
      },
    };
  });
}
