import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { Analysis, HistoryEntry } from '../../server/models';
import { passphrase, startApi, type Api } from '../support/api';
import {
  approvedPart,
  approvedReceiver,
  criteriaOf,
  decide,
  decided,
  inDays,
  inspectedLot,
  lotOf,
  mark,
  measured,
  nextRevision,
  offsetsCsv,
  openHouse,
  receiverOf,
  registeredLot,
  spread,
  today,
  type House,
} from '../support/lot-life';
import { uploadText } from '../support/readings';
import { loadUpload } from '../../server/services/uploads/load-upload';
import { handleAnalyse } from '../../server/jobs/handlers/analyse';

let api: Api;
let house: House;
let part: { id: string; partNumber: string; revisionId: string };
beforeAll(async () => {
  api = await startApi();
  house = await openHouse(api);
  part = await approvedPart(house);
});
afterAll(() => api.close());

describe('registering a lot', () => {
  const body = (changes: object = {}) => ({
    lotNumber: `L-${mark()}`,
    partId: part.id,
    supplierId: api.suppliers.first.id,
    lotSize: 40,
    receivedOn: today(),
    ...changes,
  });

  it('binds it to the criteria in force on the day it came, and says what is owed', async () => {
    const lot = await registeredLot(house, { partId: part.id });
    expect(lot).toMatchObject({
      state: 'received',
      partRevision: { id: part.revisionId, revision: 'A' },
      unitsPlanned: 10,
      newerRevision: null,
    });
    expect(lot.owed.map((item) => item.kind)).toEqual(['units', 'analysis']);
    expect(lot.owed[0]!.text).toBe('10\u00a0units still to be measured: 0 of 10 done.');
  });

  it('takes every lot number once, whatever its letters’ case', async () => {
    const lotNumber = `L-${mark()}-a`;
    await house.technician.post('/api/lots').send(body({ lotNumber })).expect(201);
    const again = await house.technician
      .post('/api/lots')
      .send(body({ lotNumber: lotNumber.toUpperCase() }))
      .expect(409);
    expect(again.body.error).toMatchObject({
      code: 'lot.exists',
      message: `Lot ${lotNumber} is registered already.`,
      fields: { lotNumber: expect.any(String) },
    });
  });

  it('of two people with the same number at once, lets one in', async () => {
    const same = body();
    const answers = await Promise.all(
      [house.technician, house.quality].map((agent) => agent.post('/api/lots').send(same)),
    );
    expect(answers.map((answer) => answer.status).sort()).toEqual([201, 409]);
  });

  it.each([
    ['a day that has not come', { receivedOn: inDays(3) }, 'receivedOn'],
    ['no units', { lotSize: 0 }, 'lotSize'],
    ['half a unit', { lotSize: 2.5 }, 'lotSize'],
    ['more units than any lot has', { lotSize: 10_000_001 }, 'lotSize'],
    ['a number that looks like markup', { lotNumber: '<b>L</b>' }, 'lotNumber'],
    ['no number', { lotNumber: '  ' }, 'lotNumber'],
    ['an unknown supplier', { supplierId: '11111111-1111-4111-8111-111111111111' }, 'supplierId'],
    ['an unknown part', { partId: '11111111-1111-4111-8111-111111111111' }, 'partId'],
  ])('refuses %s and names the field', async (_what, changes, field) => {
    const answer = await house.technician.post('/api/lots').send(body(changes)).expect(400);
    expect(Object.keys(answer.body.error.fields as object)).toContain(field);
  });

  it('takes no state, finding, version or plan from whoever sends them', async () => {
    const answer = await house.technician
      .post('/api/lots')
      .send(
        body({
          state: 'accepted',
          finding: 'accept',
          version: 7,
          dataVersion: 9,
          unitsPlanned: 0,
          planMet: true,
          inspectAll: false,
          registeredBy: api.people.quality.id,
          currentAnalysisId: '11111111-1111-4111-8111-111111111111',
        }),
      )
      .expect(201);
    expect(answer.body).toMatchObject({
      state: 'received',
      finding: null,
      version: 1,
      unitsPlanned: 10,
      registeredBy: { id: api.people.technician.id },
      currentAnalysisId: null,
    });
  });

  it.each(['auditor', 'admin', 'supplier'] as const)('is not for the %s', async (who) => {
    await house[who].post('/api/lots').send(body()).expect(403);
  });
});

describe('criteria in force', () => {
  it('judge a lot by its day of receipt, not by the day of its decision', async () => {
    const own = await approvedPart(house, { effectiveFrom: '2026-01-01' });
    const before = await inspectedLot(house, { partId: own.id, offsetsPpm: spread(10, 0, 3) });
    await nextRevision(house, own.id, 'B', today(), { toleranceLowPpm: -2, toleranceHighPpm: 2 });
    const late = await registeredLot(house, { partId: own.id, receivedOn: '2026-06-01' });
    const now = await inspectedLot(house, { partId: own.id, offsetsPpm: spread(10, 0, 3) });
    expect(late.partRevision.revision).toBe('A');
    expect(now.partRevision.revision).toBe('B');
    expect(now.finding).toBe('hold');
    const same = await lotOf(house.quality, before.id);
    expect(same).toMatchObject({
      finding: 'accept',
      partRevision: { revision: 'A' },
      newerRevision: 'B',
      currentAnalysisId: before.currentAnalysisId,
    });
    await decided(house.quality, before.id, { decision: 'accept' });
  });

  it('lets a revision for a later day wait until that day', async () => {
    const own = await approvedPart(house);
    await nextRevision(house, own.id, 'B', inDays(10), {});
    expect((await registeredLot(house, { partId: own.id })).partRevision.revision).toBe('A');
  });

  it('cannot be dated back once another was in force', async () => {
    const own = await approvedPart(house);
    const drafted = await house.admin
      .post(`/api/parts/${own.id}/revisions`)
      .send({ revision: 'B', criteria: criteriaOf() })
      .expect(201);
    const { id } = drafted.body.revisions.find((r: { revision: string }) => r.revision === 'B');
    const answer = await house.quality
      .post(`/api/parts/${own.id}/revisions/${id}/approval`)
      .send({ password: passphrase, reason: 'Backdated.', effectiveFrom: '2026-03-01' })
      .expect(400);
    expect(answer.body.error.code).toBe('revision.backdated');
  });

  it('are owed their approval while they are a draft; what was made of a draft is made anew', async () => {
    const made = await house.admin
      .post('/api/parts')
      .send({ partNumber: `TX-${mark()}`, deviceKind: 'XO', criteria: criteriaOf() })
      .expect(201);
    const [revision] = made.body.revisions;
    const lot = await inspectedLot(house, { partId: made.body.id });
    expect(lot.owed.map((item) => item.kind)).toEqual(['criteria']);
    const refused = await decide(house.quality, lot.id, { decision: 'accept' });
    expect(refused.status).toBe(409);
    expect(refused.body.error.code).toBe('lot.owes');
    await house.quality
      .post(`/api/parts/${made.body.id}/revisions/${revision.id}/approval`)
      .send({ password: passphrase, reason: 'Agreed.', effectiveFrom: '2026-01-01' })
      .expect(200);
    const stale = await decide(house.quality, lot.id, { decision: 'accept' });
    expect(stale.body.error.code).toBe('analysis.superseded');
    await handleAnalyse({ lotId: lot.id });
    const fresh = await lotOf(house.quality, lot.id);
    expect(fresh.owed).toEqual([]);
    const analysis = (await Analysis.findByPk(fresh.currentAnalysisId!))!;
    expect(analysis.criteria.part.effectiveFrom).toBe('2026-01-01');
    await decided(house.quality, lot.id, { decision: 'accept' });
  });

  it('include the receivers that use the part', async () => {
    const receiver = await approvedReceiver(house);
    const own = await approvedPart(house, { receiverIds: [receiver.id] });
    const lot = await inspectedLot(house, { partId: own.id });
    expect(lot.receivers).toMatchObject([{ id: receiver.revisionId, name: receiver.name }]);
    const { body } = await house.auditor.get(`/api/lots/${lot.id}/analysis`).expect(200);
    expect(body.links).toHaveLength(1);
  });
});

describe('judging again by other criteria', () => {
  const rejudge = (lotId: string, changes: object) =>
    house.quality
      .post(`/api/lots/${lotId}/rejudgement`)
      .send({ password: passphrase, reason: 'Customer agreed to revision B.', ...changes });

  it('is a signed act with a reason, and leaves the earlier analysis as it was', async () => {
    const own = await approvedPart(house);
    const lot = await inspectedLot(house, { partId: own.id, offsetsPpm: spread(10, 0, 3) });
    const revisionB = await nextRevision(house, own.id, 'B', today(), { toleranceHighPpm: 2 });
    const first = (await Analysis.findByPk(lot.currentAnalysisId!))!;
    await rejudge(lot.id, { partRevisionId: revisionB, reason: '' }).expect(400);
    const wrong = await rejudge(lot.id, { partRevisionId: revisionB, password: 'nope' });
    expect(wrong.status).toBe(403);
    expect((await lotOf(house.quality, lot.id)).may.rejudge).toBe(true);
    const { body } = await rejudge(lot.id, { partRevisionId: revisionB }).expect(200);
    expect(body).toMatchObject({ partRevision: { revision: 'B' }, finding: 'hold' });
    expect(body.currentAnalysisId).not.toBe(first.id);
    const kept = (await Analysis.findByPk(first.id))!;
    expect(kept.resultText).toBe(first.resultText);
    const entry = await HistoryEntry.findOne({ where: { act: 'lot.rejudge', lotId: lot.id } });
    expect(JSON.parse(entry!.payload)).toMatchObject({
      reason: 'Customer agreed to revision B.',
      before: { partRevisionId: own.revisionId },
      after: { partRevisionId: revisionB, signatureId: expect.any(String) },
    });
  });

  it('makes a signed acceptance fall, whose signature stays with its analysis', async () => {
    const own = await approvedPart(house);
    const lot = await inspectedLot(house, { partId: own.id });
    const signed = await decided(house.quality, lot.id, { decision: 'accept' });
    const revisionB = await nextRevision(house, own.id, 'B', today(), { toleranceHighPpm: 9 });
    const { body } = await rejudge(lot.id, { partRevisionId: revisionB }).expect(200);
    expect(body.state).toBe('awaiting_disposition');
    const list = await house.auditor.get(`/api/lots/${lot.id}/dispositions`).expect(200);
    expect(list.body.items).toMatchObject([
      { id: signed.id, state: 'overtaken', current: false, analysisId: signed.analysisId },
    ]);
  });

  it('refuses what is no approved revision of the part, the same criteria, and one receiver twice', async () => {
    const receiver = await approvedReceiver(house);
    const own = await approvedPart(house, { receiverIds: [receiver.id] });
    const lot = await inspectedLot(house, { partId: own.id });
    await rejudge(lot.id, { partRevisionId: part.revisionId }).expect(400);
    const same = await rejudge(lot.id, { partRevisionId: own.revisionId }).expect(409);
    expect(same.body.error.code).toBe('lot.same_criteria');
    const drafted = await house.admin
      .post(`/api/receivers/${receiver.id}/revisions`)
      .send({ revision: 'B', criteria: receiverOf({ farEndTolerancePpm: 2 }) })
      .expect(201);
    const { id } = drafted.body.revisions.find((r: { revision: string }) => r.revision === 'B');
    const draft = { partRevisionId: own.revisionId, receiverRevisionIds: [id] };
    await rejudge(lot.id, draft).expect(400);
    await house.quality
      .post(`/api/receivers/${receiver.id}/revisions/${id}/approval`)
      .send({ password: passphrase, reason: 'Agreed.', effectiveFrom: today() })
      .expect(200);
    const twice = [receiver.revisionId, id];
    await rejudge(lot.id, { ...draft, receiverRevisionIds: twice }).expect(400);
    expect((await lotOf(house.quality, lot.id)).may.rejudge).toBe(true);
    const { body } = await rejudge(lot.id, draft).expect(200);
    expect(body.receivers).toMatchObject([{ id, revision: 'B' }]);
  });

  it('is not for a rejected lot', async () => {
    const own = await approvedPart(house);
    const lot = await inspectedLot(house, { partId: own.id });
    await decided(house.quality, lot.id, { decision: 'reject' });
    const revisionB = await nextRevision(house, own.id, 'B', today());
    await rejudge(lot.id, { partRevisionId: revisionB }).expect(409);
  });
});

describe('what a lot still owes', () => {
  const owedBy = async (lotId: string) =>
    (await lotOf(house.technician, lotId)).owed.map((item) => item.kind);

  it('counts down as units are measured', async () => {
    const lot = await registeredLot(house, { partId: part.id });
    await measured(house, lot.id, spread(4));
    const after = await lotOf(house.technician, lot.id);
    expect(after).toMatchObject({ state: 'under_inspection', unitsMeasured: 4 });
    expect(after.owed.map((item) => item.text)).toEqual([
      '6\u00a0units still to be measured: 4 of 10 done.',
    ]);
    await measured(house, lot.id, spread(6, 1));
    expect(await lotOf(house.technician, lot.id)).toMatchObject({
      state: 'awaiting_disposition',
      owed: [],
    });
  });

  it('includes the required temperatures', async () => {
    const own = await approvedPart(house, { criteria: { requiredTemperaturesC: [-40, 85] } });
    const lot = await inspectedLot(house, { partId: own.id });
    expect(await owedBy(lot.id)).toEqual(['temperatures']);
  });

  it('includes the resistance, where the part limits it', async () => {
    const own = await approvedPart(house, { criteria: { greatestResistanceOhm: 60 } });
    const lot = await inspectedLot(house, { partId: own.id });
    expect(await owedBy(lot.id)).toEqual(['characteristics']);
    expect(lot.owed[0]!.text).toMatch(/^10\u00a0units not yet read for resistance/);
  });

  it('includes an upload that is still being read', async () => {
    const lot = await registeredLot(house, { partId: part.id });
    const id = await uploadText(house.technician, lot.id, offsetsCsv(spread(10)));
    expect(await owedBy(lot.id)).toEqual(['units', 'uploads_running']);
    await loadUpload(id);
    expect(await owedBy(lot.id)).toEqual([]);
  });

  it('includes a bench that was out of calibration, and readings that name no bench', async () => {
    const bench = await house.admin
      .post('/api/benches')
      .send({
        name: `Bench ${mark()}`,
        counter: 'counter',
        expandedUncertaintyPpm: 0.5,
        calibrationDue: inDays(-1),
      })
      .expect(201);
    const lot = await registeredLot(house, { partId: part.id });
    const id = await uploadText(house.technician, lot.id, offsetsCsv(spread(10)), {
      benchId: bench.body.id,
    });
    await loadUpload(id);
    const owing = await lotOf(house.quality, lot.id);
    expect(owing.owed.map((item) => item.kind)).toEqual(['bench']);
    expect(owing.may.decide).not.toContain('accept');
    const lenient = await approvedPart(house, { criteria: { requireBenchInCalibration: false } });
    const other = await registeredLot(house, { partId: lenient.id });
    await loadUpload(
      await uploadText(house.technician, other.id, offsetsCsv(spread(10)), {
        benchId: bench.body.id,
      }),
    );
    expect(await owedBy(other.id)).toEqual([]);
  });

  it('includes warnings of uploads until a quality engineer has cleared them', async () => {
    const first = await registeredLot(house, { partId: part.id });
    const second = await registeredLot(house, { partId: part.id });
    const csv = offsetsCsv(spread(10));
    await loadUpload(await uploadText(house.technician, first.id, csv));
    const id = await uploadText(house.technician, second.id, csv, { acceptWarnings: 'true' });
    await loadUpload(id);
    expect(await owedBy(second.id)).toEqual(['warnings']);
    await house.quality
      .post(`/api/uploads/${id}/warnings/clearance`)
      .send({ reason: 'Same tray, measured for both.' })
      .expect(200);
    expect(await owedBy(second.id)).toEqual([]);
  });

  it('blocks acceptance and nothing else, concession included', async () => {
    const lot = await registeredLot(house, { partId: part.id });
    await measured(house, lot.id, spread(4));
    const { may } = await lotOf(house.quality, lot.id);
    expect([...may.decide].sort()).toEqual([
      'accept_under_concession',
      'hold',
      'inspect_all',
      'reject',
    ]);
    const refused = await decide(house.quality, lot.id, { decision: 'accept' });
    expect(refused.status).toBe(409);
    expect(refused.body.error).toMatchObject({
      code: 'lot.owes',
      message: 'The lot cannot be accepted yet. 6\u00a0units still to be measured: 4 of 10 done.',
    });
    await decided(house.quality, lot.id, { decision: 'accept_under_concession' });
  });
});

describe('correcting what was registered', () => {
  it('plans anew for another size, asks for the version that was read, and ends with the first decision', async () => {
    const lot = await inspectedLot(house, { partId: part.id });
    const change = {
      dateCode: '2645',
      purchaseOrder: 'PO-9',
      lotSize: 30,
      version: lot.version,
      reason: 'Counted again.',
    };
    const changed = await house.technician.put(`/api/lots/${lot.id}`).send(change).expect(200);
    expect(changed.body).toMatchObject({ dateCode: '2645', lotSize: 30 });
    expect(changed.body.currentAnalysisId).not.toBe(lot.currentAnalysisId);
    const stale = await house.quality.put(`/api/lots/${lot.id}`).send(change).expect(409);
    expect(stale.body.error.code).toBe('record.changed');
    await decided(house.quality, lot.id, { decision: 'accept' });
    const { version } = await lotOf(house.technician, lot.id);
    const late = await house.technician
      .put(`/api/lots/${lot.id}`)
      .send({ ...change, version })
      .expect(409);
    expect(late.body.error.code).toBe('lot.decided');
  });
});
