import { countOf } from '@shared/format/counts';
import { act } from '../../history/act';
import { type Actor } from '../../http/actor';
import { HoldMessage } from '../../models';
import { mayAnswer } from '../../policies/holds';
import { lockHold, refuse } from './find-hold';
import { checkEvidence, keepEvidence, type EvidenceFile } from './keep-evidence';
import { tellHouse } from './tell';

export interface HoldAnswer {
  containment: string;
  cause: string;
  correctiveAction: string;
  text: string;
}

/** Act `hold.answer`: containment, cause and corrective action with evidence. May be repeated until the hold is closed. */
export function answerHold(
  actor: Actor,
  id: string,
  answer: HoldAnswer,
  files: EvidenceFile[],
): Promise<void> {
  return act(actor, 'hold.answer', async (transaction) => {
    const context = await lockHold(transaction, actor, id);
    const { hold, lot, supplier } = context;
    if (!mayAnswer(actor, hold)) refuse(hold, 'answer');
    const checked = checkEvidence(files);
    const before = { state: hold.state };
    await hold.update(
      {
        state: 'answered',
        answeredAt: hold.answeredAt ?? new Date(),
        version: hold.version + 1,
      },
      { transaction },
    );
    const message = await HoldMessage.create(
      { holdId: id, kind: 'answer', authorId: actor.id, side: 'supplier', ...answer },
      { transaction },
    );
    const attachments = await keepEvidence(transaction, actor, message.id, checked);
    await tellHouse(transaction, context, {
      kind: 'hold.answered',
      subject: `${hold.number}: ${before.state === 'answered' ? 'answered again' : 'answered'}`,
      paragraphs: [
        `${supplier.name} has answered. The second decision on the lot waits for a quality engineer.`,
        ...(answer.text ? [answer.text] : []),
      ],
      facts: [
        ['Lot', lot.lotNumber],
        ['Containment', answer.containment],
        ['Cause', answer.cause],
        ['Corrective action', answer.correctiveAction],
        ['Evidence', attachments.length === 0 ? 'none' : countOf(attachments.length, 'file')],
        ['By', actor.name],
      ],
      linkLabel: 'Read the answer and decide',
    });
    return {
      result: undefined,
      entry: {
        recordType: 'hold',
        recordId: id,
        lotId: lot.id,
        before,
        after: { state: 'answered', messageId: message.id, ...answer, attachments },
      },
    };
  });
}
