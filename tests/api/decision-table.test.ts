import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { decisions, type Decision } from '../../shared/contract/dispositions';
import { lotStates, type LotState } from '../../shared/contract/lots';
import { HistoryEntry } from '../../server/models';
import { passphrase, startApi, type Agent, type Api } from '../support/api';
import {
  approvedPart,
  countersigned,
  decide,
  decided,
  lotOf,
  mark,
  measured,
  nextRevision,
  offsetsCsv,
  openHouse,
  registeredLot,
  spread,
  today,
  type House,
} from '../support/lot-life';

/*
 * What may happen to a lot: every state, every act, every role. `ok` or the code of the refusal, for a quality engineer;
 * other roles are refused by their role except where the table below says so. An empty table entry cannot pass: each is
 * asked of the running server.
 */
type Act =
  | Decision
  | 'countersign'
  | 'refuse_second'
  | 'sort'
  | 'rejudge'
  | 'change'
  | 'upload'
  | 'withdraw';
const acts: Act[] = [
  ...decisions,
  'countersign',
  'refuse_second',
  'sort',
  'rejudge',
  'change',
  'upload',
  'withdraw',
];

const expected: Record<LotState | 'awaiting_second', Record<Act, string>> = {
  received: {
    accept: 'analysis.not_of_lot',
    hold: 'analysis.not_of_lot',
    accept_under_concession: 'analysis.not_of_lot',
    reject: 'analysis.not_of_lot',
    inspect_all: 'analysis.not_of_lot',
    countersign: 'record.not_found',
    refuse_second: 'record.not_found',
    sort: 'analysis.not_of_lot',
    rejudge: 'ok',
    change: 'ok',
    upload: 'ok',
    withdraw: 'record.not_found',
  },
  under_inspection: {
    accept: 'lot.owes',
    hold: 'ok',
    accept_under_concession: 'ok',
    reject: 'ok',
    inspect_all: 'ok',
    countersign: 'record.not_found',
    refuse_second: 'record.not_found',
    sort: 'lot.not_all_measured',
    rejudge: 'ok',
    change: 'ok',
    upload: 'ok',
    withdraw: 'ok',
  },
  awaiting_disposition: {
    accept: 'ok',
    hold: 'ok',
    accept_under_concession: 'ok',
    reject: 'ok',
    inspect_all: 'ok',
    countersign: 'record.not_found',
    refuse_second: 'record.not_found',
    sort: 'lot.not_all_measured',
    rejudge: 'ok',
    change: 'ok',
    upload: 'ok',
    withdraw: 'ok',
  },
  awaiting_second: {
    accept: 'disposition.awaiting_second',
    hold: 'disposition.awaiting_second',
    accept_under_concession: 'disposition.awaiting_second',
    reject: 'disposition.awaiting_second',
    inspect_all: 'disposition.awaiting_second',
    countersign: 'disposition.same_signer',
    refuse_second: 'ok',
    sort: 'disposition.awaiting_second',
    rejudge: 'disposition.awaiting_second',
    change: 'lot.decided',
    upload: 'ok',
    withdraw: 'ok',
  },
  on_hold: {
    accept: 'lot.not_inspected_again',
    hold: 'lot.state',
    accept_under_concession: 'ok',
    reject: 'ok',
    inspect_all: 'ok',
    countersign: 'disposition.not_waiting',
    refuse_second: 'disposition.not_waiting',
    sort: 'lot.not_all_measured',
    rejudge: 'ok',
    change: 'lot.decided',
    upload: 'ok',
    withdraw: 'ok',
  },
  accepted: {
    accept: 'lot.state',
    hold: 'ok',
    accept_under_concession: 'lot.state',
    reject: 'lot.state',
    inspect_all: 'lot.state',
    countersign: 'disposition.not_waiting',
    refuse_second: 'disposition.not_waiting',
    sort: 'lot.state',
    rejudge: 'ok',
    change: 'lot.decided',
    upload: 'ok',
    withdraw: 'upload.not_withdrawable',
  },
  accepted_under_concession: {
    accept: 'lot.state',
    hold: 'ok',
    accept_under_concession: 'lot.state',
    reject: 'lot.state',
    inspect_all: 'lot.state',
    countersign: 'disposition.not_waiting',
    refuse_second: 'disposition.not_waiting',
    sort: 'lot.state',
    rejudge: 'ok',
    change: 'lot.decided',
    upload: 'ok',
    withdraw: 'upload.not_withdrawable',
  },
  rejected: {
    accept: 'lot.state',
    hold: 'lot.state',
    accept_under_concession: 'lot.state',
    reject: 'lot.state',
    inspect_all: 'lot.state',
    countersign: 'disposition.not_waiting',
    refuse_second: 'disposition.not_waiting',
    sort: 'lot.state',
    rejudge: 'lot.state',
    change: 'lot.decided',
    upload: 'lot.closed',
    withdraw: 'upload.not_withdrawable',
  },
};
const cases = Object.keys(expected) as (keyof typeof expected)[];

/** What a technician may do at all; where the quality engineer is refused, so is the technician. */
const technicians: Act[] = ['change', 'upload', 'withdraw'];

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

interface Standing {
  lotId: string;
  uploadId: string;
  dispositionId: string;
}
const nobody = '11111111-1111-4111-8111-111111111111';

async function lotIn(state: keyof typeof expected): Promise<Standing> {
  // Received before revision B took effect, so that there is a newer one to judge by.
  const lot = await registeredLot(house, { partId: part.id, receivedOn: '2026-06-01' });
  const standing = { lotId: lot.id, uploadId: nobody, dispositionId: nobody };
  if (state === 'received') return standing;
  standing.uploadId = await measured(house, lot.id, spread(state === 'under_inspection' ? 4 : 10));
  const decision = (
    {
      on_hold: 'hold',
      accepted: 'accept',
      accepted_under_concession: 'accept_under_concession',
      awaiting_second: 'accept_under_concession',
      rejected: 'reject',
    } as Partial<Record<string, Decision>>
  )[state];
  if (decision) standing.dispositionId = (await decided(house.quality, lot.id, { decision })).id;
  if (state === 'accepted_under_concession')
    expect((await countersigned(house.quality2, standing.dispositionId)).status).toBe(201);
  return standing;
}

async function perform(agent: Agent, act: Act, { lotId, uploadId, dispositionId }: Standing) {
  const { currentAnalysisId, version } = await lotOf(house.auditor, lotId);
  const signing = { password: passphrase, reason: 'By the table.' };
  switch (act) {
    case 'countersign':
      return countersigned(agent, dispositionId);
    case 'refuse_second':
      return agent
        .post(`/api/dispositions/${dispositionId}/refusal`)
        .send({ reason: 'Taken back.' });
    case 'sort':
      return agent.post(`/api/lots/${lotId}/sorting`).send({
        ...signing,
        analysisId: currentAnalysisId ?? nobody,
        subLotNumber: `L-${mark()}`,
        treatment: 'scrap',
      });
    case 'rejudge':
      return agent
        .post(`/api/lots/${lotId}/rejudgement`)
        .send({ ...signing, partRevisionId: revisionB });
    case 'change':
      return agent
        .put(`/api/lots/${lotId}`)
        .send({ dateCode: '2650', lotSize: 39, version, reason: 'Counted again.' });
    case 'upload':
      return agent
        .post(`/api/lots/${lotId}/uploads`)
        .attach('file', Buffer.from(offsetsCsv(spread(2))), 'more.csv');
    case 'withdraw':
      return agent.post(`/api/uploads/${uploadId}/withdrawal`).send({ reason: 'Wrong tray.' });
    default:
      return agent
        .get(`/api/lots/${lotId}`)
        .then(() => decideAs(agent, lotId, act, currentAnalysisId));
  }
}

/** The analysis is looked up by the auditor: a supplier contact cannot even read the lot. */
async function decideAs(
  agent: Agent,
  lotId: string,
  decision: Decision,
  analysisId: string | null,
) {
  if (agent !== house.supplier) return decide(agent, lotId, { decision });
  return agent.post(`/api/lots/${lotId}/dispositions`).send({
    decision,
    analysisId: analysisId ?? nobody,
    password: passphrase,
    reason: 'By the table.',
    treatment: 'scrap',
    concession: { greatestQuantity: 1, nonconformity: 'Spread.' },
  });
}

describe.each(cases)('a lot that is %s', (state) => {
  let standing: Standing | null = null;
  it.each(acts)('and a quality engineer: %s', async (act) => {
    standing ??= await lotIn(state);
    const before = await HistoryEntry.count();
    const answer = await perform(house.quality, act, standing);
    if (expected[state][act] === 'ok') {
      expect(answer.body.error).toBeUndefined();
      expect(await HistoryEntry.count()).toBe(before + 1);
      standing = null;
    } else {
      expect(answer.body.error).toMatchObject({ code: expected[state][act] });
      expect(answer.body.error.message).toMatch(/\w+ .*[.?]$/);
      expect(await HistoryEntry.count()).toBe(before);
    }
  });

  it('shows exactly the decisions that it takes', async () => {
    const { lotId } = await lotIn(state);
    const { may } = await lotOf(house.quality, lotId);
    expect([...may.decide].sort()).toEqual(
      decisions.filter((decision) => expected[state][decision] === 'ok').sort(),
    );
    for (const who of ['technician', 'auditor', 'admin'] as const)
      expect((await lotOf(house[who], lotId)).may).toMatchObject({
        decide: [],
        countersign: false,
        rejudge: false,
        upload: who === 'technician' && expected[state].upload === 'ok',
      });
  });

  it.each(['auditor', 'admin', 'supplier', 'technician'] as const)(
    'and the %s: refused by role whatever is tried',
    async (who) => {
      const untouched = await lotIn(state);
      const before = await HistoryEntry.count();
      const { version } = await lotOf(house.auditor, untouched.lotId);
      for (const act of acts) {
        if (who === 'technician' && technicians.includes(act)) continue;
        const answer = await perform(house[who], act, untouched);
        expect([act, answer.status]).toEqual([act, 403]);
      }
      expect((await lotOf(house.auditor, untouched.lotId)).version).toBe(version);
      expect(await HistoryEntry.count()).toBe(before);
    },
  );

  it.each(technicians)('and the technician: %s as the quality engineer', async (act) => {
    const answer = await perform(house.technician, act, await lotIn(state));
    if (expected[state][act] === 'ok') expect(answer.body.error).toBeUndefined();
    else expect(answer.body.error).toMatchObject({ code: expected[state][act] });
  });
});

it('leaves no state of the contract out', () => {
  expect(cases.filter((name) => name !== 'awaiting_second').sort()).toEqual([...lotStates].sort());
});
