import { execFileSync } from 'node:child_process';
import { mkdtempSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { Analysis } from '../../server/models';
import { startApi, type Api } from '../support/api';
import {
  approvedPart,
  approvedReceiver,
  countersigned,
  decided,
  inspectedLot,
  lotOf,
  mark,
  measured,
  openHouse,
  registeredLot,
  spread,
  type House,
} from '../support/lot-life';
import { asOperator } from '../support/outside';

let api: Api;
let house: House;
let part: { id: string; partNumber: string };
const link = { name: '' };
beforeAll(async () => {
  api = await startApi();
  house = await openHouse(api);
  const receivers = [
    await approvedReceiver(house),
    await approvedReceiver(house, {
      carrierHz: '2450000000',
      symbolRateHz: '250000',
      frontEndBandwidthHz: '1000000',
    }),
  ];
  link.name = receivers[0]!.name;
  part = await approvedPart(house, {
    receiverIds: receivers.map((r) => r.id),
    criteria: {
      samplingRule: { kind: 'attribute', level: 'II', aqlPercent: 0.65 },
      decisionRule: { kind: 'guardedAcceptance', factor: 1 },
    },
  });
});
afterAll(() => api.close());

async function certificate(lotId: string, dispositionId?: string): Promise<Buffer> {
  const answer = await house.auditor
    .get(`/api/lots/${lotId}/certificate.pdf`)
    .query(dispositionId ? { dispositionId } : {})
    .buffer(true)
    .parse((response, done) => {
      const pieces: Buffer[] = [];
      response.on('data', (piece: Buffer) => pieces.push(piece));
      response.on('end', () => done(null, Buffer.concat(pieces)));
    })
    .expect(200)
    .expect('Content-Type', 'application/pdf');
  return answer.body as Buffer;
}

/** What a person reads, by a program that knows nothing of ours; runs of space made one. */
function textOf(pdf: Buffer): string {
  const file = join(mkdtempSync(join(tmpdir(), 'quartzhold-pdf-')), 'certificate.pdf');
  writeFileSync(file, pdf);
  return execFileSync('pdftotext', ['-layout', file, '-'], { encoding: 'utf8' }).replace(
    /[\s\u00a0]+/g,
    ' ',
  );
}

const sample = [...spread(77, 1.9, 2.2), 11.4, -12.9, 12.2];
const bigLot = (wishes: object = {}) =>
  inspectedLot(house, { partId: part.id, lotSize: 1000, offsetsPpm: sample, ...wishes });

describe('the lot certificate', () => {
  it('says who, what, by which rule, with which figures, signed by whom, page by page', async () => {
    const lot = await bigLot();
    const first = await decided(house.quality, lot.id, {
      decision: 'accept_under_concession',
      reason: 'The clock is set daily.',
    });
    await countersigned(house.quality2, first.id);
    const text = textOf(await certificate(lot.id));
    const analysis = (await Analysis.findByPk(first.analysisId))!;
    for (const figure of [
      `Lot ${lot.lotNumber}, decision 1`,
      part.partNumber,
      '16,000,000 Hz',
      'Nordfjord Crystals',
      '1,000 units',
      'Accepted under concession',
      'The clock is set daily.',
      'Spread wider than agreed.',
      '40 units, until',
      'note 14',
      'A, in force from 1 Jan 2026',
      '±10 ppm at 25 °C',
      '3 units, 3.8 %',
      'with 95 % confidence',
      'nonconforming',
      link.name,
      'Quentin Quality, quality engineer',
      'Quirina Quality, quality engineer',
      'acceptance under concession, second signature',
      first.contentHash,
      analysis.inputHash,
      analysis.criteriaHash,
      analysis.resultHash,
      'do not replace, the contract',
      'page 1 of',
    ])
      expect(text).toContain(figure);
    const pages = [...text.matchAll(/page (\d+) of (\d+)/g)].map((m) => [
      Number(m[1]),
      Number(m[2]),
    ]);
    expect(pages.map(([page]) => page)).toEqual(pages.map((_, i) => i + 1));
    expect(new Set(pages.map(([, of]) => of))).toEqual(new Set([pages.length]));
    const result = JSON.parse(analysis.resultText) as { finding: { reasons: { text: string }[] } };
    for (const { text: reason } of result.finding.reasons)
      expect(text).toContain(reason.replace(/[\s\u00a0]+/g, ' '));
  });

  it('is the same tomorrow, byte for byte, whatever is renamed or comes after', async () => {
    const lot = await bigLot();
    const { id } = await decided(house.quality, lot.id, { decision: 'accept_under_concession' });
    await countersigned(house.quality2, id);
    const before = await certificate(lot.id, id);
    await asOperator(api, `UPDATE suppliers SET name = 'Renamed ' || name`);
    await asOperator(
      api,
      `UPDATE people SET name = 'Married ' || name WHERE role = 'quality_engineer'`,
    );
    await asOperator(api, `UPDATE receivers SET name = name || ' II'`);
    await asOperator(
      api,
      `UPDATE benches SET name = name || ' moved', calibration_due = '2031-01-01'`,
    );
    await measured(house, lot.id, spread(5));
    expect((await lotOf(house.auditor, lot.id)).state).toBe('awaiting_disposition');
    const after = await certificate(lot.id, id);
    expect(after.equals(before)).toBe(true);
    const none = await house.auditor.get(`/api/lots/${lot.id}/certificate.pdf`).expect(409);
    expect(none.body.error).toMatchObject({ code: 'certificate.none' });
    await asOperator(api, `UPDATE suppliers SET name = 'Nordfjord Crystals' WHERE id = $1`, [
      api.suppliers.first.id,
    ]);
    await asOperator(api, `UPDATE people SET name = replace(name, 'Married ', '')`);
  });

  it('shows markup and formulas in names as the text they are, in any script, and wraps what is long', async () => {
    const name = `<script>alert(1)</script> =1+1 Żółć ГОСТ 小 ${'X'.repeat(120)}`;
    const supplier = await house.admin
      .post('/api/suppliers')
      .send({ name: name.slice(0, 190) })
      .expect(201);
    const lot = await bigLot({ supplierId: supplier.body.id, lotNumber: `L_${mark()} #1/2` });
    await decided(house.quality, lot.id, {
      decision: 'reject',
      reason: `=cmd|' /C calc'!A0 & <b>bold</b>\n${'long '.repeat(700)}end`,
    });
    const text = textOf(await certificate(lot.id));
    for (const shown of [
      '<script>alert(1)</script> =1+1 Żółć ГОСТ [U+5C0F]',
      "=cmd|' /C calc'!A0 & <b>bold</b>",
      'The units go back to the supplier.',
    ])
      expect(text).toContain(shown);
    expect(text.replace(/page \d+ of \d+/g, '').match(/long/g)).toHaveLength(1400);
  });

  it('is refused with a sentence while nothing is signed, waits for the second signature, or was refused', async () => {
    const lot = await registeredLot(house, { partId: part.id });
    const unsigned = await house.technician.get(`/api/lots/${lot.id}/certificate.pdf`).expect(409);
    expect(unsigned.body.error).toEqual({
      code: 'certificate.none',
      message: 'No decision is signed on this lot yet, so there is nothing to certify.',
    });
    const asked = await bigLot();
    const { id } = await decided(house.quality, asked.id, { decision: 'accept_under_concession' });
    const waits = await house.auditor.get(`/api/lots/${asked.id}/certificate.pdf`).expect(409);
    expect(waits.body.error.message).toMatch(/second signature/);
    await house.quality
      .post(`/api/dispositions/${id}/refusal`)
      .send({ reason: 'Not agreed.' })
      .expect(200);
    const refused = await house.auditor
      .get(`/api/lots/${asked.id}/certificate.pdf`)
      .query({ dispositionId: id })
      .expect(409);
    expect(refused.body.error.message).toMatch(/refused/);
    await house.supplier.get(`/api/lots/${asked.id}/certificate.pdf`).expect(403);
    const foreign = await house.auditor
      .get(`/api/lots/${lot.id}/certificate.pdf`)
      .query({ dispositionId: id });
    expect(foreign.status).toBe(404);
  });

  it('is refused when what is stored no longer fits what was signed', async () => {
    const lot = await bigLot();
    const { id, analysisId } = await decided(house.quality, lot.id, { decision: 'hold' });
    await certificate(lot.id, id);
    await asOperator(api, 'ALTER TABLE analyses DISABLE TRIGGER USER');
    await asOperator(
      api,
      `UPDATE analyses SET result_text = replace(result_text, '"headline":"', '"headline":"All well. ') WHERE id = $1`,
      [analysisId],
    );
    await asOperator(api, 'ALTER TABLE analyses ENABLE TRIGGER USER');
    const answer = await house.auditor.get(`/api/lots/${lot.id}/certificate.pdf`).expect(409);
    expect(answer.body.error.code).toBe('certificate.broken');
  });
});
