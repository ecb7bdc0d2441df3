import { type Decision, type SignDisposition } from '@shared/contract/dispositions';
import { type Transaction } from 'sequelize';
import { type Actor } from '../../http/actor';
import { Conflict } from '../../http/errors';
import { Analysis, Disposition, type Lot, PartRevision, Person } from '../../models';
import { decisionsFor } from '../../policies/lots';
import { lotFacts } from '../lots/lot-facts';

const words: Record<Decision, string> = {
  accept: 'accepted',
  hold: 'held',
  accept_under_concession: 'accepted under concession',
  reject: 'rejected',
  inspect_all: 'inspected unit by unit',
};
const states = {
  received: 'received',
  under_inspection: 'under inspection',
  awaiting_disposition: 'awaiting disposition',
  on_hold: 'on hold',
  accepted: 'accepted',
  accepted_under_concession: 'accepted under concession',
  rejected: 'rejected',
} as const;

/**
 * Refuses a decision that does not rest on the readings as they are now, or that the lot's state does not allow, and says
 * why: what is owed, or who decided first. The caller holds the lot's lock.
 */
export async function checkDisposition(
  transaction: Transaction,
  actor: Actor,
  lot: Lot,
  input: Pick<SignDisposition, 'decision' | 'analysisId'>,
): Promise<Analysis> {
  const analysis = await Analysis.findOne({
    where: { id: input.analysisId, lotId: lot.id },
    transaction,
  });
  if (!analysis)
    throw new Conflict(
      'analysis.not_of_lot',
      'This analysis is not one of this lot. Load the lot again.',
      { analysisId: 'Not an analysis of this lot.' },
    );
  const revision = (await PartRevision.findByPk(lot.partRevisionId, { transaction }))!;
  const { owed, facts } = await lotFacts(lot, revision.criteria, transaction);
  if (facts.awaitingSecondFrom)
    throw new Conflict(
      'disposition.awaiting_second',
      `A concession signed by ${await nameOf(transaction, facts.awaitingSecondFrom)} waits for its second signature. Sign or refuse that one first.`,
    );
  if (!decisionsFor({ ...facts, owes: false }).includes(input.decision))
    throw await notNow(transaction, actor, lot, input.decision, facts.inspectedSinceHold);
  if (analysis.id !== lot.currentAnalysisId || analysis.dataVersion !== lot.dataVersion) {
    throw new Conflict(
      'analysis.superseded',
      'The readings or the criteria changed since you opened this lot. Load it again and judge what is there now.',
    );
  }
  if (!decisionsFor(facts).includes(input.decision)) {
    throw new Conflict(
      'lot.owes',
      `The lot cannot be accepted yet. ${owed.map((item) => item.text).join(' ')}`,
    );
  }
  return analysis;
}

async function nameOf(transaction: Transaction, personId: string): Promise<string> {
  return (await Person.findByPk(personId, { transaction }))?.name ?? 'somebody';
}

async function notNow(
  transaction: Transaction,
  actor: Actor,
  lot: Lot,
  decision: Decision,
  inspectedSinceHold: boolean,
) {
  const last = await Disposition.findOne({
    where: { lotId: lot.id },
    order: [['number', 'DESC']],
    transaction,
  });
  const who =
    last && (last.signedBy === actor.id ? 'you' : await nameOf(transaction, last.signedBy));
  const since = last
    ? ` It was ${words[last.decision]} by ${who} at ${last.signedAt.toISOString()}.`
    : '';
  if (lot.state === 'on_hold' && decision === 'accept' && !inspectedSinceHold) {
    return new Conflict(
      'lot.not_inspected_again',
      `After a hold the lot has to be inspected again before it is accepted: upload new readings first.${since}`,
    );
  }
  return new Conflict(
    'lot.state',
    `The lot is ${states[lot.state as keyof typeof states]} and cannot be ${words[decision as Decision]} now.${since}`,
  );
}
