import { type Transaction } from 'sequelize';
import { act } from '../../history/act';
import { type Actor } from '../../http/actor';
import { Conflict, NotFound } from '../../http/errors';
import { Analysis, Disposition, type Lot } from '../../models';
import { lockLot } from '../lots/find-lot';
import { proveSigner } from '../signing/prove-signer';
import { sign } from '../signing/sign';
import { approvalsSeen } from './customer-approval';
import { dispositionContent } from './disposition-content';
import { restoreHold } from './restore-hold';
import { changeState, closeOpenHold } from './sign-disposition';

async function waiting(
  transaction: Transaction,
  id: string,
): Promise<{ disposition: Disposition; lot: Lot }> {
  const found = await Disposition.findByPk(id, { transaction });
  if (!found) throw new NotFound('This decision');
  // Lot first, then its decision: the order that every act keeps, so that none waits for another in a ring.
  const lot = await lockLot(found.lotId, transaction);
  const disposition = (await Disposition.findByPk(id, {
    transaction,
    lock: transaction.LOCK.UPDATE,
  }))!;
  if (disposition.state !== 'awaiting_second')
    throw new Conflict(
      'disposition.not_waiting',
      'This decision does not wait for a second signature any more.',
    );
  return { disposition, lot };
}

/** Act `disposition.countersign`: another quality engineer signs the concession, and only then it counts. */
export async function countersign(
  actor: Actor,
  id: string,
  input: { password: string; reason: string },
): Promise<void> {
  await proveSigner(actor, input.password);
  await act(actor, 'disposition.countersign', async (transaction) => {
    const { disposition, lot } = await waiting(transaction, id);
    if (disposition.signedBy === actor.id)
      throw new Conflict(
        'disposition.same_signer',
        'The second signature must be another person’s.',
      );
    if (disposition.dataVersion !== lot.dataVersion)
      throw new Conflict(
        'analysis.superseded',
        'The readings or the criteria changed since the first signature. The concession has to be signed anew.',
      );
    const analysis = (await Analysis.findByPk(disposition.analysisId, { transaction }))!;
    const signature = await sign(transaction, {
      actor,
      recordType: 'disposition',
      recordId: id,
      recordVersion: disposition.number,
      meaning: 'acceptance under concession, second signature',
      reason: input.reason,
      content: {
        ...(await dispositionContent(transaction, lot, analysis, {
          decision: disposition.decision,
          reason: disposition.reason,
          analysisId: analysis.id,
          concession: disposition.concession ?? undefined,
        })),
        firstSignatureHash: disposition.contentHash,
        customerApprovals: await approvalsSeen(transaction, id),
      },
    });
    const before = { state: lot.state, disposition: 'awaiting_second' };
    await disposition.update({ state: 'in_force' }, { transaction });
    await changeState(transaction, lot, 'accepted_under_concession');
    await closeOpenHold(transaction, actor, lot, disposition);
    return {
      result: undefined,
      entry: {
        recordType: 'disposition',
        recordId: id,
        lotId: lot.id,
        before,
        after: { state: lot.state, disposition: 'in_force', contentHash: signature.contentHash },
        reason: input.reason,
      },
    };
  });
}

/** Act `disposition.refuse` by another engineer, or `disposition.take_back` by the first one: the lot waits again. */
export async function refuseSecond(actor: Actor, id: string, reason: string): Promise<void> {
  const signer = await Disposition.findByPk(id, { attributes: ['signedBy'] });
  const name = signer?.signedBy === actor.id ? 'disposition.take_back' : 'disposition.refuse';
  await act(actor, name, async (transaction) => {
    const { disposition, lot } = await waiting(transaction, id);
    await disposition.update({ state: 'refused' }, { transaction });
    await restoreHold(transaction, lot);
    return {
      result: undefined,
      entry: {
        recordType: 'disposition',
        recordId: id,
        lotId: lot.id,
        before: { disposition: 'awaiting_second' },
        after: { disposition: 'refused' },
        reason,
      },
    };
  });
}
