import { type AnalysisResult } from '@shared/contract/analysis';
import { type SignDisposition } from '@shared/contract/dispositions';
import { type LotState } from '@shared/contract/lots';
import { type Transaction } from 'sequelize';
import { act, record } from '../../history/act';
import { type Actor } from '../../http/actor';
import { Conflict, InvalidInput } from '../../http/errors';
import { type Analysis, Disposition, Hold, type Lot } from '../../models';
import { closeHold } from '../holds/close-hold';
import { openHold } from '../holds/open-hold';
import { analyseLot } from '../analysis/analyse-lot';
import { lockLot } from '../lots/find-lot';
import { proveSigner } from '../signing/prove-signer';
import { sign } from '../signing/sign';
import { checkDisposition } from './check-disposition';
import { dispositionContent, meanings } from './disposition-content';

/**
 * Act `disposition.sign`: the decision, its signature, the frozen analysis, what becomes of the lot, the notice to the
 * supplier and the history entry happen together or not at all. Of two people at once, one wins.
 */
export async function signDisposition(
  actor: Actor,
  lotId: string,
  input: SignDisposition,
): Promise<string> {
  await proveSigner(actor, input.password);
  return act(actor, 'disposition.sign', async (transaction) => {
    const containLotIds = input.decision === 'hold' ? [...new Set(input.containLotIds ?? [])] : [];
    const lot = await lockLots(transaction, lotId, containLotIds);
    const analysis = await checkDisposition(transaction, actor, lot, input);
    refuseDayPast(input);
    askForCorrection(lot, input);
    const before = { state: lot.state, dispositionId: null as string | null };
    const { disposition, contentHash } = await writeDisposition(
      transaction,
      actor,
      lot,
      analysis,
      input,
    );
    await takeEffect(transaction, actor, lot, analysis, disposition, input);
    for (const otherId of containLotIds) {
      await contain(transaction, actor, lot, analysis, otherId, input);
    }
    return {
      result: disposition.id,
      entry: {
        recordType: 'disposition',
        recordId: disposition.id,
        lotId: lot.id,
        before,
        after: {
          decision: input.decision,
          state: lot.state,
          treatment: input.treatment ?? null,
          concession: input.concession ?? null,
          analysisId: analysis.id,
          resultHash: analysis.resultHash,
          contentHash,
          correction: input.correction ?? '',
          containedLotIds: containLotIds,
        },
        reason: input.reason,
      },
    };
  });
}

/** All lots of the act in one order, so that two people who hold each other's lots along do not wait in a ring. */
async function lockLots(transaction: Transaction, lotId: string, others: string[]): Promise<Lot> {
  const locked = new Map<string, Lot>();
  for (const id of [lotId, ...others].sort()) locked.set(id, await lockLot(id, transaction));
  return locked.get(lotId)!;
}

/** Writes and signs the decision and freezes the analysis it rests on. Used for the lot itself and for lots held with it. */
export async function writeDisposition(
  transaction: Transaction,
  actor: Actor,
  lot: Lot,
  analysis: Analysis,
  input: Omit<SignDisposition, 'password'>,
) {
  await Disposition.update(
    { state: 'superseded' },
    { where: { lotId: lot.id, state: 'in_force' }, transaction },
  );
  const number =
    ((await Disposition.max<number, Disposition>('number', {
      where: { lotId: lot.id },
      transaction,
    })) ?? 0) + 1;
  const disposition = await Disposition.create(
    {
      lotId: lot.id,
      number,
      dataVersion: lot.dataVersion,
      analysisId: analysis.id,
      decision: input.decision,
      reason: input.reason,
      state: input.decision === 'accept_under_concession' ? 'awaiting_second' : 'in_force',
      treatment: input.treatment ?? null,
      concession: input.concession ?? null,
      correction: input.correction ?? '',
      contentHash: '',
      signedBy: actor.id,
      signedAt: new Date(),
    },
    { transaction },
  );
  const signature = await sign(transaction, {
    actor,
    recordType: 'disposition',
    recordId: disposition.id,
    recordVersion: number,
    meaning: meanings[input.decision],
    reason: input.reason,
    content: await dispositionContent(transaction, lot, analysis, input),
  });
  await disposition.update(
    { contentHash: signature.contentHash, signedAt: signature.signedAt },
    { transaction },
  );
  if (!analysis.frozenAt) await analysis.update({ frozenAt: signature.signedAt }, { transaction });
  return { disposition, contentHash: signature.contentHash };
}

/** Moves the lot on and closes or opens its hold. A concession waits for its second signature. */
async function takeEffect(
  transaction: Transaction,
  actor: Actor,
  lot: Lot,
  analysis: Analysis,
  disposition: Disposition,
  input: SignDisposition,
) {
  switch (input.decision) {
    case 'accept_under_concession':
      return;
    case 'hold':
      await changeState(transaction, lot, 'on_hold');
      await notify(transaction, actor, lot, analysis, disposition, input);
      return;
    case 'accept':
    case 'reject':
      await changeState(transaction, lot, input.decision === 'accept' ? 'accepted' : 'rejected');
      await closeOpenHold(transaction, actor, lot, disposition);
      return;
    case 'inspect_all':
      // Every unit is owed from now on: another plan is another set of criteria, so the lot is analysed anew.
      lot.set({
        inspectAll: true,
        dataVersion: lot.dataVersion + 1,
        state: 'under_inspection',
        stateSince: new Date(),
        version: lot.version + 1,
      });
      await lot.save({ transaction });
      await closeOpenHold(transaction, actor, lot, disposition);
      await analyseLot(transaction, lot.id);
      await lot.reload({ transaction });
  }
}

export async function changeState(
  transaction: Transaction,
  lot: Lot,
  state: LotState,
): Promise<void> {
  lot.set({ state, stateSince: new Date(), version: lot.version + 1 });
  await lot.save({ transaction });
}

/** The second decision ends the hold, and the supplier is told. */
export async function closeOpenHold(
  transaction: Transaction,
  actor: Actor,
  lot: Lot,
  disposition: Disposition,
): Promise<void> {
  const hold = await Hold.findOne({
    where: { lotId: lot.id, state: ['open', 'acknowledged', 'answered'] },
    transaction,
    lock: transaction.LOCK.UPDATE,
  });
  if (hold)
    await closeHold(transaction, { holdId: hold.id, disposition, actor, text: disposition.reason });
}

function notify(
  transaction: Transaction,
  actor: Actor,
  lot: Lot,
  analysis: Analysis,
  disposition: Disposition,
  input: SignDisposition,
) {
  const result = JSON.parse(analysis.resultText) as AnalysisResult;
  return openHold(transaction, {
    lot,
    disposition,
    analysis,
    actor,
    reason: input.reason,
    acknowledgementDays: input.acknowledgementDays ?? 2,
    answerDays: input.answerDays ?? 10,
    findingSentences: result.finding.reasons
      .filter((reason) => reason.weight === 'against')
      .map((reason) => reason.text),
    strip: result.bandStrip,
  });
}

/** Another lot of the same part, supplier and date code is held with this one, on the same analysis, until it is judged itself. */
async function contain(
  transaction: Transaction,
  actor: Actor,
  cause: Lot,
  analysis: Analysis,
  otherId: string,
  input: SignDisposition,
) {
  const other = await lockLot(otherId, transaction);
  if (
    other.partId !== cause.partId ||
    other.supplierId !== cause.supplierId ||
    other.dateCode !== cause.dateCode ||
    cause.dateCode === '' ||
    other.id === cause.id
  ) {
    throw new InvalidInput(
      'Only lots of the same part, supplier and date code can be held along with this one.',
      { containLotIds: 'Not of the same part, supplier and date code.' },
    );
  }
  if (other.state === 'on_hold' || other.state === 'rejected')
    throw new Conflict('lot.state', `Lot ${other.lotNumber} is on hold or rejected already.`);
  if (await Disposition.count({ where: { lotId: otherId, state: 'awaiting_second' }, transaction }))
    throw new Conflict(
      'disposition.awaiting_second',
      `A concession of lot ${other.lotNumber} waits for its second signature. Refuse that one first.`,
    );
  const reason = `Held with lot ${cause.lotNumber}: ${input.reason}`;
  const { disposition, contentHash } = await writeDisposition(transaction, actor, other, analysis, {
    ...input,
    reason,
    containLotIds: undefined,
  });
  const before = { state: other.state };
  await changeState(transaction, other, 'on_hold');
  await notify(transaction, actor, other, analysis, disposition, { ...input, reason });
  await record(transaction, actor, 'disposition.contain', {
    recordType: 'disposition',
    recordId: disposition.id,
    lotId: other.id,
    before,
    reason,
    after: {
      decision: 'hold',
      state: 'on_hold',
      causeLotId: cause.id,
      analysisId: analysis.id,
      contentHash,
    },
  });
}

/** What was nonconforming is accepted only once it is said what was corrected (ISO 9001:2015 8.7.2). */
function askForCorrection(lot: Lot, { decision, correction }: SignDisposition) {
  if (lot.state === 'on_hold' && decision === 'accept' && !correction)
    throw new InvalidInput('Say what was corrected before the lot is accepted after its hold.', {
      correction: 'Say what was corrected.',
    });
}

function refuseDayPast({ concession }: SignDisposition) {
  const today = new Date().toISOString().slice(0, 10);
  if (concession?.until && concession.until < today)
    throw new InvalidInput('The concession would have ended already.', {
      'concession.until': 'Choose today or a later day.',
    });
}
