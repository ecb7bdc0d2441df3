import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { act } from '../../../server/history/act';
import { HistoryEntry, HoldMessage, Mail, Person } from '../../../server/models';
import { closeHold } from '../../../server/services/holds/close-hold';
import { startApi, type Agent, type Api } from '../../support/api';
import { actorFor, heldLot } from '../../support/held-lot';

const answer = {
  containment: 'Stock of the date code is blocked.',
  cause: 'A worn electrode mask.',
  correctiveAction: 'The mask is replaced and checked weekly.',
};

describe('a hold as a conversation', () => {
  let api: Api;
  let supplier: Agent;
  let quality: Agent;
  beforeAll(async () => {
    api = await startApi();
    [supplier, quality] = await Promise.all([api.agentFor('supplier'), api.agentFor('quality')]);
  });
  afterAll(() => api?.close());

  const close = async (held: Awaited<ReturnType<typeof heldLot>>) => {
    const actor = actorFor(api.people.quality);
    const second = await held.disposition('reject', 2);
    await act(actor, 'disposition.sign', async (transaction) => ({
      result: await closeHold(transaction, {
        holdId: held.hold.id,
        disposition: second,
        actor,
        text: 'The cause does not explain the tail.',
      }),
      entry: { recordType: 'lot', recordId: held.lot.id },
    }));
  };
  const entriesOf = (id: string) =>
    HistoryEntry.findAll({ where: { recordType: 'hold', recordId: id }, order: ['at'] });
  const mailsOf = (holdId: string, kind: string) => Mail.findAll({ where: { holdId, kind } });

  it('goes from notice through acknowledgement and answer to the closing, one history entry an act', async () => {
    const held = await heldLot(api);
    const url = `/api/holds/${held.hold.id}`;
    const opened = (await supplier.get(url).expect(200)).body;
    expect(opened).toMatchObject({
      state: 'open',
      overdue: false,
      reason: 'Three units beyond the limits.',
      may: { acknowledge: true, answer: false, ask: true, reply: false },
      next: { mine: true },
      part: { partNumber: held.part.partNumber },
    });
    expect(opened.bandStrip.beyondCount).toBe(3);
    expect(opened.messages).toHaveLength(1);

    const acknowledged = await supplier
      .post(`${url}/acknowledgement`)
      .send({ note: 'Read.' })
      .expect(201);
    expect(acknowledged.body).toMatchObject({
      state: 'acknowledged',
      may: { acknowledge: false, answer: true },
    });
    const answered = await supplier.post(`${url}/answers`).send(answer).expect(201);
    expect(answered.body).toMatchObject({ state: 'answered', may: { answer: true } });
    expect(answered.body.messages.at(-1)).toMatchObject({ kind: 'answer', ...answer });
    const again = await supplier
      .post(`${url}/answers`)
      .send({ ...answer, text: 'With the measurements.' })
      .expect(201);
    expect(again.body.answeredAt).toBe(answered.body.answeredAt);
    expect((await quality.get(url)).body.next).toEqual({
      text: 'Read the answer and decide',
      mine: true,
    });
    await close(held);
    const closed = (await supplier.get(url).expect(200)).body;
    expect(closed).toMatchObject({
      state: 'closed',
      may: { acknowledge: false, answer: false, ask: false, reply: false },
    });
    expect(closed.messages.at(-1)).toMatchObject({
      kind: 'closing',
      author: { name: 'Quentin Quality', side: 'house' },
    });
    expect((await entriesOf(held.hold.id)).map((entry) => entry.act)).toEqual([
      'hold.acknowledge',
      'hold.answer',
      'hold.answer',
    ]);
    expect(await mailsOf(held.hold.id, 'hold.answered')).toHaveLength(4);
    expect(await mailsOf(held.hold.id, 'hold.closing')).toHaveLength(1);
  });

  /** Every act in every state: who may do it and what the refusal is called. */
  const table: [state: string, act: string, expected: string][] = [
    ['open', 'acknowledgement', '201'],
    ['open', 'answers', 'hold.not_acknowledged'],
    ['open', 'messages', '201'],
    ['acknowledged', 'acknowledgement', 'hold.acknowledged'],
    ['acknowledged', 'answers', '201'],
    ['acknowledged', 'messages', '201'],
    ['answered', 'acknowledgement', 'hold.acknowledged'],
    ['answered', 'answers', '201'],
    ['answered', 'messages', '201'],
    ['closed', 'acknowledgement', 'hold.closed'],
    ['closed', 'answers', 'hold.closed'],
    ['closed', 'messages', 'hold.closed'],
  ];
  it.each(table)('when %s, %s gives %s', async (state, what, expected) => {
    const held = await heldLot(api);
    await held.hold.update({ state: state as never });
    const before = (await entriesOf(held.hold.id)).length;
    const response = await supplier
      .post(`/api/holds/${held.hold.id}/${what}`)
      .send(what === 'messages' ? { text: 'When?' } : what === 'answers' ? answer : {});
    if (expected === '201') {
      expect(response.status).toBe(201);
      expect(await entriesOf(held.hold.id)).toHaveLength(before + 1);
    } else {
      expect(response.status).toBe(409);
      expect(response.body.error.code).toBe(expected);
      expect(await entriesOf(held.hold.id)).toHaveLength(before);
    }
  });

  it.each(['technician', 'auditor', 'administrator'])('lets the %s only read', async (role) => {
    const agent = await api.agentFor(role);
    const { hold } = await heldLot(api);
    const url = `/api/holds/${hold.id}`;
    await agent.get(url).expect(200);
    await agent.post(`${url}/acknowledgement`).send({}).expect(403);
    await agent.post(`${url}/answers`).send(answer).expect(403);
    await agent.post(`${url}/messages`).send({ text: 'Well?' }).expect(403);
  });

  it('lets a quality engineer neither acknowledge nor answer for the supplier', async () => {
    const { hold } = await heldLot(api);
    await quality.post(`/api/holds/${hold.id}/acknowledgement`).send({}).expect(403);
    await quality.post(`/api/holds/${hold.id}/answers`).send(answer).expect(403);
  });

  it('counts twenty acknowledgements at once as one', async () => {
    const { hold } = await heldLot(api);
    const responses = await Promise.all(
      Array.from({ length: 20 }, () =>
        supplier.post(`/api/holds/${hold.id}/acknowledgement`).send({}),
      ),
    );
    expect(responses.filter(({ status }) => status === 201)).toHaveLength(1);
    expect(responses.filter(({ status }) => status === 409)).toHaveLength(19);
    expect(await HoldMessage.count({ where: { holdId: hold.id, kind: 'acknowledgement' } })).toBe(
      1,
    );
  });

  it('carries questions and replies both ways and mails the other side', async () => {
    const { hold } = await heldLot(api);
    const url = `/api/holds/${hold.id}`;
    await quality.post(`${url}/messages`).send({ text: 'Which mask?' }).expect(201);
    await supplier.post(`${url}/acknowledgement`).send({}).expect(201);
    const asked = (await supplier.get(url)).body;
    expect(asked.may.reply).toBe(true);
    expect(asked.next).toEqual({ text: 'Reply to our question', mine: true });
    await supplier.post(`${url}/messages`).send({ text: 'Number 4.' }).expect(201);
    await supplier.post(`${url}/messages`).send({ text: 'Shall we send it?' }).expect(201);
    const seen = (await quality.get(url)).body;
    expect(seen.messages.map((message: { kind: string }) => message.kind)).toEqual([
      'notice',
      'question',
      'acknowledgement',
      'reply',
      'question',
    ]);
    expect(seen.may.reply).toBe(true);
    const [question] = await mailsOf(hold.id, 'hold.question').then((mails) =>
      mails.filter(({ personId }) => personId === api.people.supplier.id),
    );
    expect(question!.textBody).toContain('Which mask?');
    // Two quality engineers hear of the supplier's question.
    expect(await mailsOf(hold.id, 'hold.question')).toHaveLength(3);
  });

  it('names the signer to the supplier, and no other person of the house', async () => {
    const { hold } = await heldLot(api);
    const quality2 = await api.agentFor('quality2');
    await quality2.post(`/api/holds/${hold.id}/messages`).send({ text: 'Which mask?' }).expect(201);
    const forSupplier = (await supplier.get(`/api/holds/${hold.id}`)).body;
    const names = forSupplier.messages.map((m: { author: { name: string } }) => m.author.name);
    expect(names).toEqual(['Quentin Quality', 'Quality engineering']);
    const text = JSON.stringify(forSupplier);
    for (const person of [api.people.quality, api.people.quality2, api.people.technician])
      expect(text).not.toContain(person.id);
    const question = (await mailsOf(hold.id, 'hold.question'))[0]!;
    expect(question.textBody + question.htmlBody).not.toContain('Quirina');
    const forHouse = (await quality.get(`/api/holds/${hold.id}`)).body;
    expect(forHouse.messages[1].author.name).toBe('Quirina Quality');
  });

  it('names what is missing in an answer', async () => {
    const { hold } = await heldLot(api);
    const response = await supplier
      .post(`/api/holds/${hold.id}/answers`)
      .send({ containment: 'Blocked.', cause: ' ', text: '' })
      .expect(400);
    expect(Object.keys(response.body.error.fields).sort()).toEqual(['cause', 'correctiveAction']);
  });

  it('tells the quality engineers when the supplier has nobody to be told', async () => {
    const { hold } = await (async () => {
      await Person.update({ state: 'disabled' }, { where: { id: api.people.supplier2.id } });
      try {
        return await heldLot(api, { supplier: api.suppliers.second });
      } finally {
        await Person.update({ state: 'active' }, { where: { id: api.people.supplier2.id } });
      }
    })();
    expect(await mailsOf(hold.id, 'hold.notice')).toHaveLength(0);
    expect(await mailsOf(hold.id, 'hold.nobody_told')).toHaveLength(2);
  });

  it('names a hold after its lot, a second one of the lot with -2, and counts nothing else', async () => {
    const held = await heldLot(api, { lotNumber: 'L 12/ä#7' });
    expect(held.hold.number).toBe('HOLD-L-12-7');
    const alike = await heldLot(api, { lotNumber: 'L 12/ä 7', supplier: api.suppliers.second });
    expect(alike.hold.number).toBe(`HOLD-L-12-7-${alike.lot.id.slice(0, 8)}`);
    expect((await heldLot(api, { lotNumber: '§§' })).hold.number).toMatch(/^HOLD-[0-9a-f]{8}$/);
  });

  it('pages, filters and finds', async () => {
    const held = await heldLot(api, { lotNumber: 'PAGE_%-1' });
    await heldLot(api, { lotNumber: 'PAGEx-2' });
    const all: string[] = [];
    let after = '';
    do {
      const { body } = await quality.get(`/api/holds?limit=3${after && `&after=${after}`}`);
      all.push(...body.items.map((item: { id: string }) => item.id));
      after = body.next ?? '';
    } while (after);
    expect(new Set(all).size).toBe(all.length);
    expect(all[0]).not.toBe(held.hold.id);
    expect(all).toContain(held.hold.id);
    const found = await quality.get(`/api/holds?find=${encodeURIComponent('PAGE_%')}`).expect(200);
    expect(found.body.items.map((item: { id: string }) => item.id)).toEqual([held.hold.id]);
    const open = await quality.get('/api/holds?state=not_closed&limit=200').expect(200);
    expect(open.body.items.every((item: { state: string }) => item.state !== 'closed')).toBe(true);
    await quality.get('/api/holds?after=nonsense').expect(400);
    await quality
      .get(`/api/holds?after=${Buffer.from('["x","y"]').toString('base64url')}`)
      .expect(400);
  });
});
