import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { openDatabase } from '../../server/database/connection';
import { act } from '../../server/history/act';
import { verifyHistory } from '../../server/history/verify';
import { handleAnalyse } from '../../server/jobs/handlers/analyse';
import { Disposition, HistoryEntry, Hold, Lot, Upload } from '../../server/models';
import { answerHold } from '../../server/services/holds/answer-hold';
import { acknowledgeHold } from '../../server/services/holds/acknowledge-hold';
import { countersign, refuseSecond } from '../../server/services/dispositions/second-signature';
import { signDisposition } from '../../server/services/dispositions/sign-disposition';
import { rejudgeLot } from '../../server/services/lots/rejudge-lot';
import { loadUpload } from '../../server/services/uploads/load-upload';
import { withdrawUpload } from '../../server/services/uploads/withdraw-upload';
import { longTransaction } from '../../server/database/connection';
import { passphrase, startApi, type Api } from '../support/api';
import { actorFor } from '../support/held-lot';
import {
  approvedPart,
  decided,
  evidenceFor,
  lotOf,
  measured,
  nextRevision,
  offsetsCsv,
  openHouse,
  registeredLot,
  spread,
  today,
  type House,
} from '../support/lot-life';
import { uploadText } from '../support/readings';

/*
 * Two and three people act on one lot. Each run prepares a lot, lets every one read it, and then performs their acts in
 * one of all possible orders, or all at the same moment. Afterwards the lot must be in a state that some order explains,
 * whoever came too late must have been told why, and the chain must be whole.
 */
let api: Api;
let house: House;
let part: { id: string; revisionId: string };
let revisionB: string;
beforeAll(async () => {
  api = await startApi();
  house = await openHouse(api);
  part = await approvedPart(house);
  revisionB = await nextRevision(house, part.id, 'B', today(), { toleranceHighPpm: 9.5 });
});
afterAll(() => api.close());

/** What everybody saw before the first act. */
interface Seen {
  lotId: string;
  analysisId: string;
  uploadId: string;
  /** A file that was sent and is not read yet. */
  waitingUploadId: string;
  holdId: string;
  concessionId: string;
}
type Step = (seen: Seen) => Promise<unknown>;

const sign =
  (decision: keyof typeof evidenceFor, who: 'quality' | 'quality2' = 'quality'): Step =>
  ({ lotId, analysisId }) =>
    signDisposition(actorFor(api.people[who]), lotId, {
      decision,
      analysisId,
      password: passphrase,
      reason: 'Judged on the finding.',
      ...structuredClone(evidenceFor[decision]),
    } as never);

const steps = {
  accept: sign('accept'),
  hold: sign('hold', 'quality2'),
  concede: sign('accept_under_concession'),
  reject: sign('reject', 'quality2'),
  load: ({ waitingUploadId }) => loadUpload(waitingUploadId),
  withdraw: ({ uploadId }) =>
    withdrawUpload(actorFor(api.people.technician), uploadId, 'Wrong tray.'),
  rejudge: ({ lotId }) =>
    rejudgeLot(actorFor(api.people.quality2), lotId, {
      password: passphrase,
      reason: 'Revision B agreed.',
      partRevisionId: revisionB,
    }),
  countersign: ({ concessionId }) =>
    countersign(actorFor(api.people.quality2), concessionId, {
      password: passphrase,
      reason: 'Agreed.',
    }),
  takeBack: ({ concessionId }) =>
    refuseSecond(actorFor(api.people.quality), concessionId, 'Thought again.'),
  answer: ({ holdId }) =>
    answerHold(
      actorFor(api.people.supplier),
      holdId,
      { containment: 'Stock held.', cause: 'Drift.', correctiveAction: 'Adjusted.', text: '' },
      [],
    ),
} satisfies Record<string, Step>;
type StepName = keyof typeof steps;

async function prepare(from: 'inspected' | 'held' | 'conceded'): Promise<Seen> {
  const lot = await registeredLot(house, { partId: part.id, receivedOn: '2026-06-01' });
  const uploadId = await measured(house, lot.id, spread(10));
  const seen = { lotId: lot.id, uploadId, holdId: '', concessionId: '' };
  if (from === 'held') {
    seen.holdId = (await decided(house.quality, lot.id, { decision: 'hold' })).holdId!;
    await acknowledgeHold(actorFor(api.people.supplier), seen.holdId, '');
  }
  if (from === 'conceded')
    seen.concessionId = (
      await decided(house.quality, lot.id, { decision: 'accept_under_concession' })
    ).id;
  const waitingUploadId = await uploadText(house.technician, lot.id, offsetsCsv(spread(3)));
  const { currentAnalysisId } = await lotOf(house.auditor, lot.id);
  return { ...seen, waitingUploadId, analysisId: currentAnalysisId! };
}

interface Outcome {
  step: StepName;
  code: string;
}
async function perform(step: StepName, seen: Seen): Promise<Outcome> {
  try {
    await steps[step](seen);
    return { step, code: 'ok' };
  } catch (error) {
    const refused = error as { status?: number; code?: string; message: string };
    // A refusal is an answer with a reason; anything else is a fault of ours.
    if (refused.status !== 409) throw error;
    expect(refused.message).toMatch(/^[A-Z“].*[.]$/s);
    return { step, code: refused.code! };
  }
}

function permutations<T>(items: readonly T[]): T[][] {
  if (items.length <= 1) return [[...items]];
  return items.flatMap((item, i) =>
    permutations(items.filter((_, j) => j !== i)).map((rest) => [item, ...rest]),
  );
}

/** What must hold whatever happened in whatever order. */
async function checkLot({ lotId }: Seen) {
  // The analysis of a withdrawal is a job of its own.
  await handleAnalyse({ lotId });
  const lot = (await Lot.findByPk(lotId))!;
  const live = await Disposition.findAll({
    where: { lotId, state: ['in_force', 'awaiting_second'] },
  });
  expect(live.length).toBeLessThanOrEqual(1);
  const [decision] = live;
  const stateBy: Record<string, string> = {
    accept: 'accepted',
    hold: 'on_hold',
    reject: 'rejected',
    accept_under_concession: 'accepted_under_concession',
  };
  const settled = Object.values(stateBy).includes(lot.state);
  if (decision?.state === 'in_force') expect(lot.state).toBe(stateBy[decision.decision]);
  else if (!decision) expect(settled).toBe(false);
  // An acceptance rests on the readings and criteria that the lot has now.
  if (['accepted', 'accepted_under_concession'].includes(lot.state)) {
    expect(decision!.dataVersion).toBe(lot.dataVersion);
    expect(decision!.analysisId).toBe(lot.currentAnalysisId);
  }
  const openHolds = await Hold.count({
    where: { lotId, state: ['open', 'acknowledged', 'answered'] },
  });
  expect(openHolds).toBe(lot.state === 'on_hold' ? 1 : 0);
  expect(await verifyHistory()).toMatchObject({ ok: true });
  return lot;
}

const sets: [Parameters<typeof prepare>[0], StepName[]][] = [
  ['inspected', ['load', 'hold']],
  ['inspected', ['load', 'reject']],
  ['inspected', ['hold', 'reject']],
  ['inspected', ['withdraw', 'hold']],
  ['inspected', ['rejudge', 'concede']],
  ['inspected', ['hold', 'concede', 'load']],
  ['inspected', ['withdraw', 'rejudge', 'reject']],
  ['conceded', ['countersign', 'takeBack']],
  ['conceded', ['countersign', 'load']],
  ['conceded', ['countersign', 'withdraw', 'takeBack']],
  ['held', ['answer', 'reject']],
  ['held', ['answer', 'concede', 'load']],
  ['held', ['withdraw', 'reject', 'answer']],
];

describe('acts on one lot in every order', () => {
  it.each(sets.flatMap(([from, set]) => permutations(set).map((order) => [from, order] as const)))(
    '%s: %s',
    async (from, order) => {
      const seen = await prepare(from);
      const outcomes: Outcome[] = [];
      for (const step of order) outcomes.push(await perform(step, seen));
      expect(outcomes[0]!.code).toBe('ok');
      await checkLot(seen);
    },
  );
});

describe('acts on one lot at the same moment', () => {
  it.each(sets)('%s: %s', async (from, set) => {
    for (let round = 0; round < 2; round += 1) {
      const seen = await prepare(from);
      const before = await HistoryEntry.count();
      const outcomes = await Promise.all(set.map((step) => perform(step, seen)));
      expect(outcomes.some(({ code }) => code === 'ok')).toBe(true);
      // A load that is refused still tells so in the history; every other refusal leaves no trace.
      const done = outcomes.filter(({ code, step }) => code === 'ok' && step !== 'load').length;
      const loads = outcomes.filter(({ step }) => step === 'load').length;
      expect(await HistoryEntry.count()).toBe(before + done + loads);
      await checkLot(seen);
    }
  });

  it('two who accept: one signs, the other is told who did', async () => {
    const lot = await registeredLot(house, { partId: part.id });
    await measured(house, lot.id, spread(10));
    const { currentAnalysisId } = await lotOf(house.auditor, lot.id);
    const seen = { lotId: lot.id, analysisId: currentAnalysisId! } as Seen;
    const both = await Promise.allSettled([sign('accept')(seen), sign('accept', 'quality2')(seen)]);
    const lost = both.filter((outcome) => outcome.status === 'rejected');
    expect(lost).toHaveLength(1);
    expect(lost[0]!.reason).toMatchObject({
      status: 409,
      code: 'lot.state',
      message: expect.stringMatching(/It was accepted by (Quentin|Quirina) Quality at/),
    });
  });

  it('two who hold each other’s lots along do not wait in a ring', async () => {
    const own = await approvedPart(house);
    const [a, b] = [
      await registeredLot(house, { partId: own.id }),
      await registeredLot(house, { partId: own.id }),
    ];
    for (const { id } of [a!, b!]) await measured(house, id, spread(10));
    const holding = async (who: 'quality' | 'quality2', lotId: string, other: string) => {
      const { currentAnalysisId } = await lotOf(house.auditor, lotId);
      return signDisposition(actorFor(api.people[who]), lotId, {
        decision: 'hold',
        analysisId: currentAnalysisId!,
        password: passphrase,
        reason: 'Same cause.',
        containLotIds: [other],
      });
    };
    const both = await Promise.allSettled([
      holding('quality', a!.id, b!.id),
      holding('quality2', b!.id, a!.id),
    ]);
    expect(both.map((outcome) => outcome.status).sort()).toEqual(['fulfilled', 'rejected']);
    const lost = both.find((outcome) => outcome.status === 'rejected')!;
    expect(lost.reason).toMatchObject({ status: 409, code: 'lot.state' });
    for (const { id } of [a!, b!]) expect((await Lot.findByPk(id))!.state).toBe('on_hold');
  });

  it('a file that is still arriving holds nobody up', async () => {
    const lot = await registeredLot(house, { partId: part.id });
    await measured(house, lot.id, spread(10));
    const arriving = await longTransaction();
    await Upload.create(
      { lotId: lot.id, fileName: 'slow.csv', uploadedBy: api.people.quality.id },
      { transaction: arriving },
    );
    await decided(house.quality, lot.id, { decision: 'hold' });
    await arriving.rollback();
    expect((await Lot.findByPk(lot.id))!.state).toBe('on_hold');
  });
});

describe('many at once', () => {
  it('two hundred writers leave one chain without gaps', async () => {
    const before = await verifyHistory();
    const actor = actorFor(api.people.quality);
    const outcomes = await Promise.allSettled(
      Array.from({ length: 200 }, (_, n) =>
        act(actor, 'test.write', async () => {
          // Every tenth is undone in the middle: a gap would show.
          if (n % 10 === 9) throw new Error('undone');
          return { result: n, entry: { recordType: 'test', recordId: String(n) } };
        }),
      ),
    );
    expect(outcomes.filter((outcome) => outcome.status === 'fulfilled')).toHaveLength(180);
    const after = await verifyHistory();
    expect(after).toMatchObject({ ok: true, count: before.count + 180 });
    const { rows } = await api.database.pool.query(
      `SELECT count(DISTINCT previous_hash)::int AS links, max(sequence)::int AS last, count(*)::int AS entries FROM history_seals`,
    );
    expect(rows[0]).toEqual({ links: after.count, last: after.count, entries: after.count });
  });

  it('every act works on a pool of one connection: nothing is asked outside its transaction', async () => {
    const prepared = {
      inspected: await prepare('inspected'),
      held: await prepare('held'),
      conceded: await prepare('conceded'),
      rejudged: await prepare('inspected'),
      withdrawn: await prepare('inspected'),
    };
    const small = openDatabase({ url: api.testDatabase.appUrl, poolMax: 1 });
    try {
      const results = [
        await perform('hold', prepared.inspected),
        await perform('answer', prepared.held),
        await perform('reject', prepared.held),
        await perform('countersign', prepared.conceded),
        await perform('rejudge', prepared.rejudged),
        await perform('withdraw', prepared.withdrawn),
      ];
      expect(results.map(({ code }) => code)).toEqual(results.map(() => 'ok'));
      const many = await Promise.allSettled(
        Array.from({ length: 8 }, (_, n) => steps[n % 2 ? 'hold' : 'reject'](prepared.rejudged)),
      );
      expect(many.every((o) => o.status === 'rejected' && o.reason.status === 409)).toBe(true);
      expect(await verifyHistory()).toMatchObject({ ok: true });
    } finally {
      await small.close();
      openDatabase({ url: api.testDatabase.appUrl, poolMax: 5 });
    }
  });
});
