import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { Attachment, type Hold, HoldMessage } from '../../../server/models';
import { startApi, type Agent, type Api } from '../../support/api';
import { heldLot } from '../../support/held-lot';

describe('two suppliers', () => {
  let api: Api;
  let first: Agent;
  let second: Agent;
  let own: Awaited<ReturnType<typeof heldLot>>;
  let foreign: Awaited<ReturnType<typeof heldLot>>;
  let attachment: Attachment;
  beforeAll(async () => {
    api = await startApi();
    [first, second] = await Promise.all([api.agentFor('supplier'), api.agentFor('supplier2')]);
    own = await heldLot(api, { lotNumber: 'OWN-1' });
    foreign = await heldLot(api, { lotNumber: 'FOREIGN-1', supplier: api.suppliers.second });
    await second.post(`/api/holds/${foreign.hold.id}/acknowledgement`).send({}).expect(201);
    await second
      .post(`/api/holds/${foreign.hold.id}/messages`)
      .field('text', 'See the list.')
      .attach('files', Buffer.from('a,b\n1,2\n'), 'list.csv')
      .expect(201);
    attachment = (await Attachment.findOne())!;
  });
  afterAll(() => api?.close());

  it('each see their own holds in the list, whatever is asked for', async () => {
    for (const query of ['', '?limit=1', '?state=not_closed', '?find=HOLD', '?find=L']) {
      const { body } = await first.get(`/api/holds${query}`).expect(200);
      expect(
        body.items.map((item: Hold) => item.number),
        query,
      ).toEqual(['HOLD-OWN-1']);
      expect(body.next).toBeNull();
    }
    for (const query of ['FOREIGN', api.suppliers.second.name, foreign.part.partNumber]) {
      const { body } = await first.get(`/api/holds?find=${encodeURIComponent(query)}`).expect(200);
      expect(body).toEqual({ items: [], next: null });
    }
    expect((await second.get('/api/holds')).body.items).toHaveLength(1);
  });

  it('get the same answer for a foreign hold as for one that never was', async () => {
    const answer = { containment: 'x', cause: 'x', correctiveAction: 'x' };
    const asks = (id: string) => [
      first.get(`/api/holds/${id}`),
      first.post(`/api/holds/${id}/acknowledgement`).send({}),
      first.post(`/api/holds/${id}/answers`).send(answer),
      first.post(`/api/holds/${id}/messages`).send({ text: 'x' }),
      first.get(`/api/holds/${id}/attachments/${attachment.id}`),
    ];
    const before = await HoldMessage.count();
    const there = await Promise.all(asks(foreign.hold.id));
    const never = await Promise.all(asks(randomUUID()));
    there.forEach((response, index) => {
      expect(response.status).toBe(404);
      expect(response.body).toEqual(never[index]!.body);
      expect(response.text).not.toContain(api.suppliers.second.name);
    });
    expect(await HoldMessage.count()).toBe(before);
  });

  it('cannot reach a foreign file through an own hold', async () => {
    await first.get(`/api/holds/${own.hold.id}/attachments/${attachment.id}`).expect(404);
    await second.get(`/api/holds/${foreign.hold.id}/attachments/${attachment.id}`).expect(200);
  });

  it('cannot read the outgoing mail', async () => {
    await first.get('/api/mail').expect(403);
    await api.stranger().get('/api/mail').expect(401);
    await api.stranger().get('/api/holds').expect(401);
  });
});
