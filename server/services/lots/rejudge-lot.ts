import { type Transaction } from 'sequelize';
import { act } from '../../history/act';
import { type Actor } from '../../http/actor';
import { Conflict, InvalidInput, NotAllowed } from '../../http/errors';
import { LotReceiver, PartRevision, ReceiverRevision } from '../../models';
import { mayRejudge } from '../../policies/lots';
import { analyseLot } from '../analysis/analyse-lot';
import { proveSigner } from '../signing/prove-signer';
import { sign } from '../signing/sign';
import { planOf } from './criteria-at-receipt';
import { lockLot } from './find-lot';
import { lotFacts } from './lot-facts';

export interface Rejudgement {
  password: string;
  reason: string;
  partRevisionId: string;
  receiverRevisionIds?: string[];
}

/** New ones are approved, and no receiver judges by two revisions at once. */
async function checkReceivers(transaction: Transaction, ids: string[], before: string[]) {
  const revisions = await ReceiverRevision.findAll({ where: { id: ids }, transaction });
  const refuse = (sentence: string) => {
    throw new InvalidInput(sentence, { receiverRevisionIds: sentence });
  };
  const usable = revisions.filter((r) => r.state === 'approved' || before.includes(r.id));
  if (usable.length !== ids.length) refuse('Choose approved receiver revisions.');
  if (new Set(revisions.map((r) => r.receiverId)).size !== ids.length)
    refuse('Choose one revision of each receiver.');
}

/**
 * Act `lot.rejudge`: the only way a lot comes under newer criteria than those in force at receipt. The earlier analysis and
 * whatever was signed on it stay as they were.
 */
export async function rejudgeLot(actor: Actor, id: string, input: Rejudgement): Promise<void> {
  await proveSigner(actor, input.password);
  await act(actor, 'lot.rejudge', async (transaction) => {
    const lot = await lockLot(id, transaction);
    const current = (await PartRevision.findByPk(lot.partRevisionId, { transaction }))!;
    const { facts } = await lotFacts(lot, current.criteria, transaction);
    if (!mayRejudge(actor, facts)) {
      throw facts.awaitingSecondFrom
        ? new Conflict(
            'disposition.awaiting_second',
            'A concession waits for its second signature. Sign or refuse it first.',
          )
        : facts.state === 'rejected'
          ? new Conflict('lot.state', 'The lot is rejected and is not judged again.')
          : new NotAllowed();
    }
    const revision = await PartRevision.findOne({
      where: { id: input.partRevisionId, partId: lot.partId },
      transaction,
    });
    if (revision?.state !== 'approved')
      throw new InvalidInput('Choose an approved revision of this part.', {
        partRevisionId: 'Not an approved revision of this part.',
      });
    const beforeLinks = await LotReceiver.findAll({ where: { lotId: id }, transaction });
    const before = {
      partRevisionId: lot.partRevisionId,
      receiverRevisionIds: beforeLinks.map((link) => link.receiverRevisionId).sort(),
    };
    const receiverRevisionIds = [
      ...new Set(input.receiverRevisionIds ?? before.receiverRevisionIds),
    ].sort();
    await checkReceivers(transaction, receiverRevisionIds, before.receiverRevisionIds);
    if (
      revision.id === before.partRevisionId &&
      receiverRevisionIds.join() === before.receiverRevisionIds.join()
    ) {
      throw new Conflict('lot.same_criteria', 'The lot is judged by these criteria already.');
    }
    const after = { partRevisionId: revision.id, receiverRevisionIds };
    const signature = await sign(transaction, {
      actor,
      recordType: 'lot',
      recordId: id,
      recordVersion: lot.version + 1,
      meaning: 'judged by other criteria',
      reason: input.reason,
      content: { lotNumber: lot.lotNumber, before, after },
    });
    lot.set({
      partRevisionId: revision.id,
      dataVersion: lot.dataVersion + 1,
      version: lot.version + 1,
    });
    lot.set({ unitsPlanned: planOf(lot, revision.criteria.samplingRule).sampleSize });
    await lot.save({ transaction });
    await LotReceiver.destroy({ where: { lotId: id }, transaction });
    await LotReceiver.bulkCreate(
      receiverRevisionIds.map((receiverRevisionId) => ({ lotId: id, receiverRevisionId })),
      { transaction },
    );
    await analyseLot(transaction, id);
    return {
      result: undefined,
      entry: {
        recordType: 'lot',
        recordId: id,
        lotId: id,
        before,
        after: { ...after, signatureId: signature.id },
        reason: input.reason,
      },
    };
  });
}
