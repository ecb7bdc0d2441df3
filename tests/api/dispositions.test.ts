import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { Analysis, Disposition, Hold, Lot, Signature } from '../../server/models';
import { verifySignature } from '../../server/services/signing/sign';
import { loadUpload } from '../../server/services/uploads/load-upload';
import { handleAnalyse } from '../../server/jobs/handlers/analyse';
import { passphrase, startApi, type Api } from '../support/api';
import {
  approvedPart,
  countersigned,
  decide,
  decided,
  inDays,
  inspectedLot,
  lotOf,
  mark,
  measured,
  offsetsCsv,
  openHouse,
  registeredLot,
  spread,
  type House,
  nextRevision,
  today,
} from '../support/lot-life';
import { uploadText } from '../support/readings';
import { asOperator, minutesPass } from '../support/outside';

let api: Api;
let house: House;
let part: { id: string; revisionId: string };
beforeAll(async () => {
  api = await startApi();
  house = await openHouse(api);
  part = await approvedPart(house);
});
afterAll(() => api.close());

const inspected = (offsetsPpm?: readonly number[]) =>
  inspectedLot(house, { partId: part.id, offsetsPpm });
const dispositionsOf = async (lotId: string) =>
  (await house.auditor.get(`/api/lots/${lotId}/dispositions`).expect(200)).body.items as {
    id: string;
    state: string;
    decision: string;
    current: boolean;
    analysisVersion: number;
    signatures: { meaning: string }[];
  }[];

describe('a signed decision', () => {
  it('binds name, time with zone, meaning, reason and what the signer saw, and freezes the analysis', async () => {
    const lot = await inspected();
    const answer = await decided(house.quality, lot.id, {
      decision: 'accept',
      reason: 'All ten inside, links bear it.',
    });
    expect(answer).toMatchObject({
      number: 1,
      state: 'in_force',
      current: true,
      signatures: [
        {
          person: { id: api.people.quality.id, name: 'Quentin Quality' },
          role: 'quality_engineer',
          meaning: 'acceptance of the lot',
          reason: 'All ten inside, links bear it.',
          zone: Intl.DateTimeFormat().resolvedOptions().timeZone,
          recordType: 'disposition',
          recordVersion: 1,
          contentHash: answer.contentHash,
        },
      ],
    });
    expect((await lotOf(house.quality, lot.id)).state).toBe('accepted');
    const analysis = (await Analysis.findByPk(answer.analysisId))!;
    expect(analysis.frozenAt).not.toBeNull();
    const signature = (await Signature.findOne({ where: { recordId: answer.id } }))!;
    expect(verifySignature(signature)).toBe(true);
    expect(JSON.parse(signature.contentText)).toMatchObject({
      decision: 'accept',
      lot: { lotNumber: lot.lotNumber, lotSize: 40 },
      analysis: { resultHash: analysis.resultHash, inputHash: analysis.inputHash },
      seen: { units: 10, headline: expect.any(String) },
    });
  });

  it('takes neither state nor signer nor time from whoever sends them', async () => {
    const lot = await inspected();
    const answer = await decided(house.quality, lot.id, {
      decision: 'hold',
      ...({
        state: 'refused',
        signedBy: api.people.quality2.id,
        signedAt: '2020-01-01T00:00:00Z',
        contentHash: 'f'.repeat(64),
        number: 99,
        lotId: '11111111-1111-4111-8111-111111111111',
        frozenAt: null,
      } as object),
    });
    expect(answer).toMatchObject({
      number: 1,
      state: 'in_force',
      lotId: lot.id,
      signedBy: { id: api.people.quality.id },
    });
    expect(Date.parse((answer as unknown as { signedAt: string }).signedAt)).toBeGreaterThan(
      Date.now() - 60_000,
    );
    expect(answer.contentHash).not.toBe('f'.repeat(64));
  });

  it('cannot change: neither it nor the analysis under it, as the application', async () => {
    const lot = await inspected();
    const { id, analysisId } = await decided(house.quality, lot.id, { decision: 'accept' });
    const refused = (sql: string) => expect(api.database.pool.query(sql)).rejects;
    const analysis = `WHERE id = '${analysisId}'`;
    await refused(`UPDATE analyses SET result_text = '{}' ${analysis}`).toThrow(/never changes/);
    await refused(`UPDATE analyses SET frozen_at = NULL ${analysis}`).toThrow(/never changes/);
    await refused(`UPDATE analyses SET criteria = '{}' ${analysis}`).toThrow(/never changes/);
    await refused(`DELETE FROM analyses ${analysis}`).toThrow(/permission denied/);
    await refused(`DELETE FROM dispositions WHERE id = '${id}'`).toThrow(/permission denied/);
    await refused(`UPDATE signatures SET reason = '' WHERE record_id = '${id}'`).toThrow(
      /permission denied/,
    );
  });

  it('cannot be moved: put on another record by the database’s owner, it does not hold', async () => {
    const from = await inspected();
    const to = await inspected();
    const { id } = await decided(house.quality, from.id, { decision: 'accept' });
    const other = await decided(house.quality2, to.id, { decision: 'hold' });
    const signature = (await Signature.findOne({ where: { recordId: id }, raw: true }))!;
    await asOperator(
      api,
      `INSERT INTO signatures SELECT (jsonb_populate_record(s, jsonb_build_object('id', gen_random_uuid(), 'record_id', $2::text))).* FROM signatures s WHERE id = $1`,
      [signature.id, other.id],
    );
    const moved = (await Signature.findOne({
      where: { recordId: other.id, personId: api.people.quality.id },
    }))!;
    expect(moved.contentHash).toBe(signature.contentHash);
    expect(verifySignature(moved)).toBe(false);
  });
});

describe('signing', () => {
  it('asks for the password each time and leaves nothing behind when it is wrong', async () => {
    const lot = await inspected();
    const answer = await decide(house.quality, lot.id, { decision: 'accept', password: 'guess' });
    expect(answer.status).toBe(403);
    expect(answer.body.error).toMatchObject({
      code: 'signing.wrong_password',
      fields: { password: expect.any(String) },
    });
    const none = await decide(house.quality, lot.id, { decision: 'accept', password: '' });
    expect(none.status).toBe(400);
    expect(await dispositionsOf(lot.id)).toEqual([]);
    expect((await lotOf(house.quality, lot.id)).state).toBe('awaiting_disposition');
    expect((await Analysis.findByPk(lot.currentAnalysisId!))!.frozenAt).toBeNull();
    await decided(house.quality, lot.id, { decision: 'accept' });
  });

  it('is locked by five wrong passwords, for the right one too, until a quarter of an hour has passed', async () => {
    const lot = await inspected();
    for (let n = 1; n <= 5; n += 1) {
      const wrong = await decide(house.quality2, lot.id, { decision: 'accept', password: 'no' });
      expect(wrong.status).toBe(n < 5 ? 403 : 429);
    }
    const right = await decide(house.quality2, lot.id, { decision: 'accept' });
    expect(right.status).toBe(429);
    expect(right.body.error).toMatchObject({
      code: 'signing.locked',
      message: expect.stringMatching(/Signing is locked for 15/),
    });
    expect(await dispositionsOf(lot.id)).toEqual([]);
    await minutesPass(api, 15);
    await decided(house.quality2, lot.id, { decision: 'accept' });
  });

  it.each([
    [
      'a rejection says nothing of the units',
      { decision: 'reject', treatment: undefined },
      'treatment',
    ],
    [
      'a concession has no limits',
      { decision: 'accept_under_concession', concession: undefined },
      'concession',
    ],
    [
      'a concession limits neither quantity nor time',
      { decision: 'accept_under_concession', concession: { nonconformity: 'Spread.' } },
      'concession',
    ],
    [
      'a concession names no nonconformity',
      {
        decision: 'accept_under_concession',
        concession: { greatestQuantity: 5, nonconformity: '' },
      },
      'concession.nonconformity',
    ],
    [
      'a concession has ended already',
      {
        decision: 'accept_under_concession',
        concession: { until: inDays(-1), nonconformity: 'Spread.' },
      },
      'concession.until',
    ],
    ['there is no reason', { decision: 'accept', reason: ' ' }, 'reason'],
    ['the decision is none of ours', { decision: 'perhaps' }, 'decision'],
  ])('is refused when %s', async (_what, changes, field) => {
    const lot = await inspected();
    const answer = await decide(house.quality, lot.id, changes as never);
    expect(answer.status).toBe(400);
    expect(Object.keys(answer.body.error.fields as object)).toContain(field);
    expect(await dispositionsOf(lot.id)).toEqual([]);
  });

  it('rests on the readings that the signer saw', async () => {
    const lot = await inspected();
    const seen = lot.currentAnalysisId!;
    await measured(house, lot.id, spread(3));
    const answer = await decide(house.quality, lot.id, { decision: 'accept', analysisId: seen });
    expect(answer.status).toBe(409);
    expect(answer.body.error.code).toBe('analysis.superseded');
    const other = await inspected();
    const foreign = await decide(house.quality, lot.id, {
      decision: 'accept',
      analysisId: other.currentAnalysisId!,
    });
    expect(foreign.body.error.code).toBe('analysis.not_of_lot');
  });
});

describe('acceptance under concession', () => {
  it('waits for the second signature of another quality engineer', async () => {
    const lot = await inspected(spread(10, 8, 3));
    const first = await decided(house.quality, lot.id, { decision: 'accept_under_concession' });
    expect(first.state).toBe('awaiting_second');
    expect(await lotOf(house.quality, lot.id)).toMatchObject({
      state: 'awaiting_disposition',
      may: { decide: [], countersign: false },
    });
    const own = await countersigned(house.quality, first.id);
    expect(own.status).toBe(409);
    expect(own.body.error.code).toBe('disposition.same_signer');
    expect((await countersigned(house.technician, first.id)).status).toBe(403);
    expect((await countersigned(house.admin, first.id)).status).toBe(403);
    expect((await countersigned(house.quality2, first.id, 'wrong')).status).toBe(403);
    const meanwhile = await decide(house.quality2, lot.id, { decision: 'reject' });
    expect(meanwhile.body.error).toMatchObject({
      code: 'disposition.awaiting_second',
      message: expect.stringContaining('Quentin Quality'),
    });
    const second = await countersigned(house.quality2, first.id);
    expect(second.status).toBe(201);
    expect(second.body).toMatchObject({
      state: 'in_force',
      concession: { greatestQuantity: 40, customerReference: 'note 14' },
      signatures: [
        { meaning: 'acceptance under concession, first signature' },
        {
          meaning: 'acceptance under concession, second signature',
          person: { id: api.people.quality2.id },
        },
      ],
    });
    expect((await lotOf(house.quality, lot.id)).state).toBe('accepted_under_concession');
    const signatures = await Signature.findAll({
      where: { recordId: first.id },
      order: ['signedAt'],
    });
    expect(signatures.map(verifySignature)).toEqual([true, true]);
    expect(JSON.parse(signatures[1]!.contentText).firstSignatureHash).toBe(first.contentHash);
    const again = await countersigned(house.quality2, first.id);
    expect(again.body.error.code).toBe('disposition.not_waiting');
  });

  it('is refused with a reason by the second, or taken back by the first, and the lot waits anew', async () => {
    const lot = await inspected();
    for (const agent of [house.quality2, house.quality]) {
      const { id } = await decided(house.quality, lot.id, { decision: 'accept_under_concession' });
      await agent.post(`/api/dispositions/${id}/refusal`).send({ reason: '' }).expect(400);
      const refused = await agent
        .post(`/api/dispositions/${id}/refusal`)
        .send({ reason: 'The customer has not agreed.' })
        .expect(200);
      expect(refused.body.state).toBe('refused');
    }
    expect(await lotOf(house.quality, lot.id)).toMatchObject({ state: 'awaiting_disposition' });
    await decided(house.quality, lot.id, { decision: 'accept' });
  });

  it('falls when readings come before the second signature', async () => {
    const lot = await inspected();
    const { id } = await decided(house.quality, lot.id, { decision: 'accept_under_concession' });
    await measured(house, lot.id, [1]);
    const late = await countersigned(house.quality2, id);
    expect(late.status).toBe(409);
    expect(await dispositionsOf(lot.id)).toMatchObject([{ state: 'overtaken', current: false }]);
  });
});

describe('the lots as CSV', () => {
  it('carry the decision that counts with name, time, zone, meaning, reason and hash of its signatures', async () => {
    const lot = await inspected();
    const { id } = await decided(house.quality, lot.id, { decision: 'accept_under_concession' });
    expect((await countersigned(house.quality2, id)).status).toBe(201);
    const { text } = await house.auditor
      .get('/api/lots.csv')
      .query({ find: lot.lotNumber })
      .expect(200);
    const [head, row] = text.replace(/^\ufeff/, '').split(/\r?\n/);
    expect(head).toMatch(
      /finding,decision,signed_by,signed_at,signed_zone,signature_meaning,signature_reason,signature_sha256/,
    );
    const [first, second] = await Signature.findAll({
      where: { recordId: id },
      order: ['signedAt'],
    });
    for (const cell of [
      'accept_under_concession',
      'Quentin Quality; Quirina Quality',
      `${first!.signedAt.toISOString()}; ${second!.signedAt.toISOString()}`,
      `${first!.contentHash}; ${second!.contentHash}`,
    ])
      expect(row).toContain(cell);
  });
});

describe('after a hold', () => {
  it('a lot is accepted only when it was inspected again and the correction is named', async () => {
    const lot = await inspected(spread(10, 9, 2));
    const held = await decided(house.quality, lot.id, { decision: 'hold' });
    expect(held.holdId).not.toBeNull();
    expect((await lotOf(house.quality, lot.id)).may.decide).not.toContain('accept');
    const early = await decide(house.quality, lot.id, { decision: 'accept' });
    expect(early.status).toBe(409);
    expect(early.body.error).toMatchObject({
      code: 'lot.not_inspected_again',
      message: expect.stringContaining('upload new readings first'),
    });
    await measured(house, lot.id, spread(10));
    const again = await lotOf(house.quality, lot.id);
    expect(again).toMatchObject({ state: 'on_hold', openHoldId: held.holdId });
    expect(again.may.decide).toContain('accept');
    const silent = await decide(house.quality, lot.id, { decision: 'accept', correction: '' });
    expect(silent.status).toBe(400);
    expect(silent.body.error.fields).toHaveProperty('correction');
    await decided(house.quality, lot.id, { decision: 'accept' });
    expect(await lotOf(house.quality, lot.id)).toMatchObject({
      state: 'accepted',
      openHoldId: null,
    });
    expect((await Hold.findByPk(held.holdId!))!.state).toBe('closed');
    expect((await dispositionsOf(lot.id)).map((d) => [d.decision, d.state])).toEqual([
      ['accept', 'in_force'],
      ['hold', 'superseded'],
    ]);
  });

  it('neither another revision nor a withdrawn file counts as inspecting again', async () => {
    const own = await approvedPart(house);
    const lot = await registeredLot(house, { partId: own.id });
    await measured(house, lot.id, spread(10));
    const spare = await measured(house, lot.id, spread(5));
    await decided(house.quality, lot.id, { decision: 'hold' });
    await house.quality
      .post(`/api/uploads/${spare}/withdrawal`)
      .send({ reason: 'Wrong tray.' })
      .expect(200);
    await handleAnalyse({ lotId: lot.id });
    const revisionB = await nextRevision(house, own.id, 'B', today(), { toleranceHighPpm: 20 });
    await house.quality
      .post(`/api/lots/${lot.id}/rejudgement`)
      .send({ password: passphrase, reason: 'Wider limits agreed.', partRevisionId: revisionB })
      .expect(200);
    const early = await decide(house.quality, lot.id, { decision: 'accept' });
    expect(early.body.error.code).toBe('lot.not_inspected_again');
    await measured(house, lot.id, spread(2));
    await decided(house.quality, lot.id, { decision: 'accept' });
  });

  it('a concession with two signatures closes it, and so does a rejection', async () => {
    for (const decision of ['accept_under_concession', 'reject'] as const) {
      const lot = await inspected();
      const { holdId } = await decided(house.quality, lot.id, { decision: 'hold' });
      const { id } = await decided(house.quality, lot.id, { decision });
      if (decision === 'accept_under_concession') {
        expect((await Hold.findByPk(holdId!))!.state).toBe('open');
        expect((await lotOf(house.quality, lot.id)).state).toBe('on_hold');
        expect((await countersigned(house.quality2, id)).status).toBe(201);
      }
      expect((await Hold.findByPk(holdId!))!.state).toBe('closed');
    }
  });

  it('a refused concession leaves the lot held, and its hold counts again', async () => {
    const lot = await inspected();
    await decided(house.quality, lot.id, { decision: 'hold' });
    const { id } = await decided(house.quality, lot.id, { decision: 'accept_under_concession' });
    await house.quality2
      .post(`/api/dispositions/${id}/refusal`)
      .send({ reason: 'Not agreed.' })
      .expect(200);
    expect(await lotOf(house.quality, lot.id)).toMatchObject({ state: 'on_hold' });
    expect(await dispositionsOf(lot.id)).toMatchObject([
      { state: 'refused' },
      { state: 'in_force' },
    ]);
    await measured(house, lot.id, spread(10));
    expect((await lotOf(house.quality, lot.id)).may.decide).toContain('accept');
    await decided(house.quality, lot.id, { decision: 'accept' });
  });
});

describe('new readings after a signed acceptance', () => {
  it.each(['accept', 'accept_under_concession'] as const)(
    'make %s fall: a new analysis, the old signature stays with the old one',
    async (decision) => {
      const lot = await inspected();
      const signed = await decided(house.quality, lot.id, { decision });
      if (decision !== 'accept')
        expect((await countersigned(house.quality2, signed.id)).status).toBe(201);
      const before = (await Analysis.findByPk(signed.analysisId))!;
      expect((await lotOf(house.technician, lot.id)).may.upload).toBe(true);
      await measured(house, lot.id, [25]);
      const after = await lotOf(house.quality, lot.id);
      expect(after).toMatchObject({ state: 'awaiting_disposition', finding: 'hold' });
      expect(after.currentAnalysisId).not.toBe(signed.analysisId);
      expect(await dispositionsOf(lot.id)).toMatchObject([
        { id: signed.id, state: 'overtaken', current: false, analysisVersion: 1 },
      ]);
      const kept = (await Analysis.findByPk(signed.analysisId))!;
      expect([kept.resultText, kept.resultHash]).toEqual([before.resultText, before.resultHash]);
      for (const signature of await Signature.findAll({ where: { recordId: signed.id } }))
        expect(verifySignature(signature)).toBe(true);
    },
  );

  it('a file without a single readable row changes nothing', async () => {
    const lot = await inspected();
    await decided(house.quality, lot.id, { decision: 'accept' });
    const id = await uploadText(
      house.technician,
      lot.id,
      'serial,temperature_c,frequency_hz,measured_at\nX1,25,none,\n',
    );
    await loadUpload(id);
    expect((await lotOf(house.quality, lot.id)).state).toBe('accepted');
  });

  it('are refused for a rejected lot, also when the file was already on its way', async () => {
    const lot = await inspected();
    const waiting = await uploadText(house.technician, lot.id, offsetsCsv(spread(2)));
    await decided(house.quality, lot.id, { decision: 'reject' });
    await loadUpload(waiting);
    const upload = await house.technician.get(`/api/uploads/${waiting}`).expect(200);
    expect(upload.body).toMatchObject({ state: 'failed', failure: { code: 'lot.closed' } });
    const late = await house.technician
      .post(`/api/lots/${lot.id}/uploads`)
      .attach('file', Buffer.from(offsetsCsv(spread(2))), 'late.csv');
    expect(late.status).toBe(409);
    expect(late.body.error).toMatchObject({
      code: 'lot.closed',
      message: expect.stringContaining('is rejected'),
    });
    expect((await lotOf(house.quality, lot.id)).currentAnalysisId).toBe(lot.currentAnalysisId);
  });
});

describe('100 % inspection', () => {
  it('owes every unit, then sorts: conforming units go on as a lot of their own', async () => {
    const lot = await inspected(spread(10, 9, 2));
    await decided(house.quality, lot.id, { decision: 'inspect_all' });
    const ordered = await lotOf(house.quality, lot.id);
    expect(ordered).toMatchObject({
      state: 'under_inspection',
      unitsPlanned: 40,
      unitsMeasured: 10,
    });
    expect(ordered.may.decide).not.toContain('inspect_all');
    const sort = (changes: object = {}) =>
      lotOf(house.quality, lot.id).then(({ currentAnalysisId }) =>
        house.quality.post(`/api/lots/${lot.id}/sorting`).send({
          password: passphrase,
          reason: 'Sorted at incoming inspection.',
          analysisId: currentAnalysisId,
          subLotNumber: `${lot.lotNumber}-S`,
          treatment: 'return_to_supplier',
          ...changes,
        }),
      );
    const early = await sort();
    expect(early.status).toBe(409);
    expect(early.body.error.code).toBe('lot.not_all_measured');
    await measured(house, lot.id, [...spread(28, 0, 2), 14, -15]);
    expect((await sort({ subLotNumber: lot.lotNumber })).body.error.code).toBe('lot.exists');
    expect((await sort({ subLotNumber: '<i>' })).status).toBe(400);
    expect((await sort({ password: 'wrong' })).status).toBe(403);
    const beyond = (await Lot.findByPk(lot.id))!.beyondCount!;
    expect(beyond).toBeGreaterThanOrEqual(2);
    const { body, status } = await sort();
    expect(status).toBe(201);
    const parent = await lotOf(house.quality, lot.id);
    expect(parent).toMatchObject({ state: 'rejected', subLots: [{ id: body.subLotId }] });
    const subLot = await lotOf(house.quality, body.subLotId);
    expect(subLot).toMatchObject({
      state: 'awaiting_disposition',
      parent: { id: lot.id },
      lotSize: 40 - beyond,
      unitsMeasured: 40 - beyond,
      beyondCount: 0,
      finding: 'accept',
      owed: [],
    });
    await decided(house.quality, subLot.id, { decision: 'accept' });
    expect((await lotOf(house.quality, subLot.id)).state).toBe('accepted');
    expect((await lotOf(house.quality, lot.id)).state).toBe('rejected');
  });

  it('has nothing to sort out when no unit conforms', async () => {
    const own = await approvedPart(house, {
      criteria: { samplingRule: { kind: 'everyUnit', allowedNonconforming: 0 } },
    });
    const lot = await inspectedLot(house, {
      partId: own.id,
      lotSize: 5,
      offsetsPpm: spread(5, 40),
    });
    const answer = await house.quality.post(`/api/lots/${lot.id}/sorting`).send({
      password: passphrase,
      reason: 'Sorted.',
      analysisId: lot.currentAnalysisId,
      subLotNumber: `L-${mark()}`,
      treatment: 'scrap',
    });
    expect(answer.body.error).toMatchObject({ code: 'lot.nothing_conforms' });
  });

  it('owes for the sub-lot what its parent’s uploads owe', async () => {
    const bench = await house.admin
      .post('/api/benches')
      .send({
        name: `Bench ${mark()}`,
        counter: 'counter',
        expandedUncertaintyPpm: 0.5,
        calibrationDue: inDays(-1),
      })
      .expect(201);
    const own = await approvedPart(house, {
      criteria: { samplingRule: { kind: 'everyUnit', allowedNonconforming: 0 } },
    });
    const lot = await registeredLot(house, { partId: own.id, lotSize: 5 });
    await loadUpload(
      await uploadText(house.technician, lot.id, offsetsCsv([0, 1, 2, 3, 30]), {
        benchId: bench.body.id,
      }),
    );
    const { currentAnalysisId } = await lotOf(house.quality, lot.id);
    const { body } = await house.quality
      .post(`/api/lots/${lot.id}/sorting`)
      .send({
        password: passphrase,
        reason: 'Sorted.',
        analysisId: currentAnalysisId,
        subLotNumber: `L-${mark()}`,
        treatment: 'scrap',
      })
      .expect(201);
    expect((await lotOf(house.quality, body.subLotId)).owed.map((o) => o.kind)).toEqual(['bench']);
  });
});

describe('containment', () => {
  it('proposes and holds other lots of the same part, supplier and date code', async () => {
    const own = await approvedPart(house);
    const make = (wishes: object = {}) => inspectedLot(house, { partId: own.id, ...wishes });
    const [cause, waiting, accepted, otherCode, elsewhere] = [
      await make(),
      await make(),
      await make(),
      await make({ dateCode: '2601' }),
      await make({ supplierId: api.suppliers.second.id }),
    ];
    await decided(house.quality, accepted.id, { decision: 'accept' });
    const { body } = await house.quality.get(`/api/lots/${cause.id}/containment`).expect(200);
    expect((body.items as { id: string }[]).map((item) => item.id).sort()).toEqual(
      [waiting.id, accepted.id].sort(),
    );
    for (const stranger of [otherCode, elsewhere, cause]) {
      const refused = await decide(house.quality, cause.id, {
        decision: 'hold',
        containLotIds: [stranger.id],
      });
      expect(refused.status).toBe(400);
    }
    expect((await lotOf(house.quality, cause.id)).state).toBe('awaiting_disposition');
    await decided(house.quality, cause.id, {
      decision: 'hold',
      containLotIds: [waiting.id, accepted.id],
    });
    for (const lot of [cause, waiting, accepted]) {
      const held = await lotOf(house.quality, lot.id);
      expect(held.state).toBe('on_hold');
      expect(held.openHoldId).not.toBeNull();
    }
    expect(await dispositionsOf(accepted.id)).toMatchObject([
      { decision: 'hold', state: 'in_force' },
      { decision: 'accept', state: 'superseded' },
    ]);
    const again = await decide(house.quality, waiting.id, { decision: 'hold' });
    expect(again.status).toBe(409);
  });

  it('leaves lots without a date code alone, and those with a concession in the air', async () => {
    const own = await approvedPart(house);
    const [cause, nameless] = [
      await inspectedLot(house, { partId: own.id, dateCode: '' }),
      await inspectedLot(house, { partId: own.id, dateCode: '' }),
    ];
    const none = await house.quality.get(`/api/lots/${cause.id}/containment`).expect(200);
    expect(none.body.items).toEqual([]);
    const refused = await decide(house.quality, cause.id, {
      decision: 'hold',
      containLotIds: [nameless.id],
    });
    expect(refused.status).toBe(400);
    const coded = await inspectedLot(house, { partId: own.id });
    const asked = await inspectedLot(house, { partId: own.id });
    await decided(house.quality, asked.id, { decision: 'accept_under_concession' });
    const waits = await decide(house.quality, coded.id, {
      decision: 'hold',
      containLotIds: [asked.id],
    });
    expect(waits.body.error).toMatchObject({
      code: 'disposition.awaiting_second',
      message: expect.stringContaining(asked.lotNumber),
    });
    expect(await Disposition.count({ where: { lotId: coded.id } })).toBe(0);
  });
});
