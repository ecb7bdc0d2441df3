import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { HistoryEntry } from '../../server/models';
import { passphrase, startApi, type Agent, type Api } from '../support/api';
import { criteriaOf, mark, openHouse, receiverOf, today, type House } from '../support/lot-life';

/*
 * Everything that changes what the house agreed on writes exactly one entry, and none when it is refused. The acts on
 * lots, uploads and decisions are counted in decision-table.test.ts and in interleavings.test.ts.
 */
let api: Api;
let house: House;
beforeAll(async () => {
  api = await startApi();
  house = await openHouse(api);
});
afterAll(() => api.close());

type Body = Record<string, unknown>;
interface Call {
  act: string;
  agent: () => Agent;
  method: 'post' | 'put' | 'delete';
  path: string;
  body?: Body;
}

async function counted({ act, agent, method, path, body }: Call) {
  const before = await HistoryEntry.count();
  const answer = await agent()
    [method](path)
    .send(body ?? {});
  expect([path, answer.status, answer.body.error]).toEqual([path, expect.any(Number), undefined]);
  expect(answer.status).toBeLessThan(300);
  expect(await HistoryEntry.count()).toBe(before + 1);
  const [newest] = await HistoryEntry.findAll({ order: [['at', 'DESC']], limit: 1 });
  expect(newest!.act).toBe(act);
  return answer.body as {
    id: string;
    version: number;
    revisions: { id: string; version: number }[];
  };
}
async function uncounted(agent: Agent, method: Call['method'], path: string, body: Body) {
  const before = await HistoryEntry.count();
  const answer = await agent[method](path).send(body);
  expect(answer.status).toBeGreaterThanOrEqual(400);
  expect(await HistoryEntry.count()).toBe(before);
}

const approval = () => ({ password: passphrase, reason: 'Agreed.', effectiveFrom: today() });

describe.each([
  {
    kind: 'part',
    path: '/api/parts',
    fields: () => ({ partNumber: `TX-${mark()}`, deviceKind: 'XO' }),
    criteria: criteriaOf(),
  },
  {
    kind: 'receiver',
    path: '/api/receivers',
    fields: () => ({ name: `Gate ${mark()}` }),
    criteria: receiverOf(),
  },
])('a $kind', ({ kind, path, fields, criteria }) => {
  it('is added, changed, revised and approved by one entry each', async () => {
    const admin = () => house.admin;
    const own = fields();
    const made = await counted({
      act: `${kind}.add`,
      agent: admin,
      method: 'post',
      path,
      body: { ...own, criteria },
    });
    const one = `${path}/${made.id}`;
    await counted({
      act: `${kind}.change`,
      agent: admin,
      method: 'put',
      path: one,
      body: { ...own, description: 'Renamed.', version: made.version },
    });
    const [draft] = made.revisions;
    await counted({
      act: `${kind}.revision.change`,
      agent: admin,
      method: 'put',
      path: `${one}/revisions/${draft!.id}`,
      body: { revision: 'A', changeNote: 'Typed anew.', criteria, version: draft!.version },
    });
    await counted({
      act: `${kind}.revision.approve`,
      agent: () => house.quality,
      method: 'post',
      path: `${one}/revisions/${draft!.id}/approval`,
      body: approval(),
    });
    await counted({
      act: `${kind}.revision.draft`,
      agent: admin,
      method: 'post',
      path: `${one}/revisions`,
      body: { revision: 'B', criteria },
    });
    await uncounted(house.admin, 'put', `${one}/revisions/${draft!.id}`, {
      revision: 'A',
      criteria,
      version: 2,
    });
    await uncounted(house.admin, 'put', one, { ...own, version: 99 });
    await uncounted(house.technician, 'post', path, { ...fields(), criteria });
    await uncounted(house.admin, 'post', path, { ...own, criteria });
  });
});

describe('the history itself', () => {
  it('gets one entry for a checkpoint, and none for being read, checked or exported', async () => {
    await counted({
      act: 'history.checkpoint',
      agent: () => house.auditor,
      method: 'post',
      path: '/api/history/checkpoints',
    });
    const before = await HistoryEntry.count();
    for (const path of ['', '.csv', '/acts', '/export', '/verification', '/checkpoints'])
      await house.auditor.get(`/api/history${path}`).expect(200);
    expect(await HistoryEntry.count()).toBe(before);
    await uncounted(house.quality, 'post', '/api/history/checkpoints', {});
  });
});
