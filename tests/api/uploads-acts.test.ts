import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { Lot } from '../../server/models';
import { startWorker } from '../../server/jobs/worker';
import { startApi, type Agent, type Api } from '../support/api';
import { someBench, someLot } from '../support/inspection';
import { ended, plainCsv, plainHeader, uploadText } from '../support/readings';

let api: Api;
let worker: { stop(): Promise<void> };
let technician: Agent;
let quality: Agent;

beforeAll(async () => {
  api = await startApi();
  worker = await startWorker();
  technician = await api.agentFor('technician');
  quality = await api.agentFor('quality');
});
afterAll(async () => {
  await worker.stop();
  await api.close();
});

const csvOf = async (agent: Agent, address: string) => {
  const answer = await agent.get(address).buffer(true).expect(200);
  return { text: answer.text, headers: answer.headers as Record<string, string> };
};
async function until<T>(look: () => Promise<T | null | undefined | false>): Promise<T> {
  for (let tries = 0; tries < 200; tries += 1) {
    const found = await look();
    if (found) return found;
    await new Promise((resolve) => setTimeout(resolve, 50));
  }
  throw new Error('It did not happen.');
}

describe('refused rows', () => {
  it('come back as a file that can be repaired and uploaded as it is', async () => {
    const lot = await someLot(api);
    const content = `${plainHeader}\nA,25,16000001,\nB,25,sixteen,\n=1+1,25,,\n"C ""x""",25,1e400,\n`;
    const upload = await ended(technician, await uploadText(technician, lot.id, content));
    expect(upload).toMatchObject({ rowsTaken: 1, rowsRefused: 3 });
    const listed = await technician.get(`/api/uploads/${upload.id}/refused?limit=2`).expect(200);
    const list = listed.body as { items: { fileLine: number }[]; next: string };
    expect(list.items.map((item) => item.fileLine)).toEqual([3, 4]);
    const rest = await technician
      .get(`/api/uploads/${upload.id}/refused?limit=2&after=${encodeURIComponent(list.next)}`)
      .expect(200);
    expect(rest.body).toMatchObject({ items: [{ fileLine: 5 }], next: null });

    const { text, headers } = await csvOf(technician, `/api/uploads/${upload.id}/refused.csv`);
    expect(headers['content-disposition']).toMatch(
      /^attachment; filename="?refused-readings.csv"?$/,
    );
    expect(text.split('\r\n')).toEqual([
      `\ufeff${plainHeader},reason`,
      'B,25,sixteen,,line 3: “sixteen” is not a number.',
      "'=1+1,25,,,line 4: The frequency is missing.",
      '"C ""x""",25,1e400,,line 5: “1e400” is far outside what can be measured.',
      '# end of export: 3 rows',
      '',
    ]);
    const asIs = await ended(technician, await uploadText(technician, lot.id, text));
    expect(asIs).toMatchObject({ state: 'done', rowsInFile: 3, rowsRefused: 3, warnings: [] });
    const repaired = text
      .replace('sixteen', '16000002')
      .replace("'=1+1,25,", "'=1+1,25,16000003")
      .replace('1e400', '16000004');
    const again = await ended(technician, await uploadText(technician, lot.id, repaired));
    expect(again).toMatchObject({ rowsInFile: 3, rowsTaken: 3, rowsRefused: 0 });
    const { rows } = await api.database.pool.query(
      `SELECT serial FROM readings r JOIN uploads u ON u.number = r.upload_number WHERE u.id = $1 ORDER BY file_line`,
      [again.id],
    );
    expect(rows.map((row) => row.serial)).toEqual(['B', '=1+1', 'C "x"']);
  });
});

describe('the original', () => {
  it('comes back byte for byte, as an attachment with a safe name', async () => {
    const lot = await someLot(api);
    const content = plainCsv(3000);
    const id = await uploadText(technician, lot.id, content, {}, '../../etc/Prüf<b>.csv');
    await ended(technician, id);
    const answer = await technician
      .get(`/api/uploads/${id}/original`)
      .buffer(true)
      .parse((response, done) => {
        const pieces: Buffer[] = [];
        response.on('data', (piece: Buffer) => pieces.push(piece));
        response.on('end', () => done(null, Buffer.concat(pieces)));
      })
      .expect(200);
    expect((answer.body as Buffer).equals(Buffer.from(content))).toBe(true);
    expect(answer.headers['content-type']).toBe('application/octet-stream');
    expect(answer.headers['content-disposition']).toMatch(/^attachment; /);
    expect(answer.headers['content-disposition']).toContain(encodeURIComponent('Prüf'));
    expect(answer.headers['content-disposition']).not.toContain('etc');
  });
});

describe('withdrawing', () => {
  it('says what goes, takes it out of the count, and lets the file come again', async () => {
    const lot = await someLot(api);
    const content = plainCsv(20);
    const id = await uploadText(technician, lot.id, content);
    await ended(technician, id);
    const preview = await technician.get(`/api/uploads/${id}/withdrawal`).expect(200);
    expect(preview.body).toMatchObject({ rowsGoing: 20, unitsGoing: 20, allowed: true });
    await technician.post(`/api/uploads/${id}/withdrawal`).send({ reason: '' }).expect(400);
    const answer = await technician
      .post(`/api/uploads/${id}/withdrawal`)
      .send({ reason: 'wrong bench' })
      .expect(200);
    expect(answer.body).toMatchObject({ state: 'withdrawn', withdrawnReason: 'wrong bench' });
    await until(async () => (await Lot.findByPk(lot.id))!.unitsMeasured === 0);
    const readings = await technician.get(`/api/lots/${lot.id}/readings`).expect(200);
    expect(readings.body).toEqual({ items: [], next: null });
    await technician
      .post(`/api/uploads/${id}/withdrawal`)
      .send({ reason: 'once more' })
      .expect(409);
    const again = await ended(technician, await uploadText(technician, lot.id, content));
    expect(again).toMatchObject({ rowsTaken: 20, rowsRefused: 0, warnings: [] });
    const acts = await api.database.pool.query(
      `SELECT act FROM history_entries WHERE record_id = $1 ORDER BY at`,
      [id],
    );
    expect(acts.rows.map((row) => row.act)).toEqual([
      'upload.receive',
      'upload.load',
      'upload.withdraw',
    ]);
  });

  it('is for the uploader or a quality engineer, and not once the lot is settled', async () => {
    const lot = await someLot(api);
    const id = await uploadText(quality, lot.id, plainCsv(5));
    await ended(technician, id);
    await technician.post(`/api/uploads/${id}/withdrawal`).send({ reason: 'mine' }).expect(409);
    await Lot.update({ state: 'rejected' }, { where: { id: lot.id } });
    const preview = await quality.get(`/api/uploads/${id}/withdrawal`).expect(200);
    expect(preview.body).toMatchObject({ allowed: false });
    await quality.post(`/api/uploads/${id}/withdrawal`).send({ reason: 'late' }).expect(409);
  });
});

describe('warnings', () => {
  it('are cleared by a quality engineer, with a reason, once', async () => {
    await someBench({ usual: true, chamberLowC: -40, chamberHighC: 85 });
    const lot = await someLot(api);
    const id = await uploadText(
      technician,
      lot.id,
      `${plainHeader}\nA,150,16000001,\nB,25,1000,\n`,
    );
    const upload = await ended(technician, id);
    expect(upload.warnings.map((warning) => warning.code)).toEqual([
      'frequency.implausible',
      'temperature.outside_chamber',
    ]);
    await technician
      .post(`/api/uploads/${id}/warnings/clearance`)
      .send({ reason: 'seen' })
      .expect(403);
    const answer = await quality
      .post(`/api/uploads/${id}/warnings/clearance`)
      .send({ reason: 'known bad unit' })
      .expect(200);
    expect((answer.body as typeof upload).warnings.every((warning) => warning.cleared)).toBe(true);
    await quality
      .post(`/api/uploads/${id}/warnings/clearance`)
      .send({ reason: 'again' })
      .expect(409);
  });
});

describe('by machine', () => {
  it('a bench uploads to a lot by its number with a token', async () => {
    const bench = await someBench({ name: 'Bench M' });
    const admin = await api.agentFor('admin');
    const issued = await admin
      .post(`/api/benches/${bench.id}/tokens`)
      .send({ label: 'line 1' })
      .expect(201);
    const { secret } = issued.body as { secret: string };
    const lot = await someLot(api);
    const send = (token: string) =>
      api
        .stranger()
        .post(`/api/machine/lots/${encodeURIComponent(lot.lotNumber.toLowerCase())}/uploads`)
        .set('Authorization', `Bearer ${token}`)
        .attach('file', Buffer.from(plainCsv(7)), 'auto.csv');
    await send('x'.repeat(43)).expect(401);
    const answer = await send(secret).expect(202);
    const upload = await ended(technician, (answer.body as { id: string }).id);
    expect(upload).toMatchObject({ state: 'done', rowsTaken: 7, bench: { name: 'Bench M' } });
    await api
      .stranger()
      .post('/api/machine/lots/NO-SUCH-LOT/uploads')
      .set('Authorization', `Bearer ${secret}`)
      .attach('file', Buffer.from(plainCsv(7)), 'auto.csv')
      .expect(404);
  });
});

describe('readings', () => {
  it('are listed page by page, filtered, and exported so that they upload again', async () => {
    const lot = await someLot(api);
    const content = `${plainHeader}\n'=cmd,25,16000200.50,2026-11-30T10:00:00.5Z\n-7,-40.0,16000001,\nB,,15999990,\n`;
    await ended(technician, await uploadText(technician, lot.id, content));
    await ended(technician, await uploadText(technician, lot.id, plainCsv(300)));
    const seen: string[] = [];
    let next: string | null = '';
    while (next !== null) {
      const answer = await technician.get(
        `/api/lots/${lot.id}/readings?limit=100${next ? `&after=${encodeURIComponent(next)}` : ''}`,
      );
      const body = answer.body as { items: { serial: string }[]; next: string | null };
      seen.push(...body.items.map((item) => item.serial));
      next = body.next;
    }
    expect(seen).toHaveLength(303);
    expect(new Set(seen).size).toBe(303);
    const found = await technician.get(`/api/lots/${lot.id}/readings?serial=S000029`).expect(200);
    expect((found.body as { items: unknown[] }).items).toHaveLength(10);
    const beyond = await technician.get(`/api/lots/${lot.id}/readings?beyond=limits`).expect(200);
    expect(beyond.body).toMatchObject({
      items: [{ serial: '=cmd', offsetPpm: 12.53125, verdict: 'nonconforming' }],
    });

    const { text } = await csvOf(technician, `/api/lots/${lot.id}/readings.csv`);
    const lines = text.split('\r\n');
    expect(lines.slice(0, 4)).toEqual([
      plainHeader,
      "'=cmd,25,16000200.50,2026-11-30T10:00:00.500000Z",
      "'-7,-40.0,16000001,",
      'B,,15999990,',
    ]);
    expect(lines.slice(-2)).toEqual(['# end of export: 303 rows', '']);
    const other = await someLot(api);
    const again = await ended(technician, await uploadText(technician, other.id, text));
    expect(again).toMatchObject({ rowsInFile: 303, rowsTaken: 303, warnings: [] });
    const copy = await csvOf(technician, `/api/lots/${other.id}/readings.csv`);
    expect(copy.text).toBe(text);
    const cut = lines.filter((_, index) => index !== 5).join('\r\n');
    const short = await ended(
      technician,
      await uploadText(technician, (await someLot(api)).id, cut),
    );
    expect(short.warnings.map((warning) => warning.code)).toEqual(['file.incomplete']);
  });
});

describe('who may', () => {
  it('an auditor reads uploads and uploads nothing; a supplier contact gets neither', async () => {
    const lot = await someLot(api);
    const id = await uploadText(technician, lot.id, plainCsv(3));
    await ended(technician, id);
    const auditor = await api.agentFor('auditor');
    const supplier = await api.agentFor('supplier');
    await auditor.get(`/api/uploads/${id}`).expect(200);
    await auditor
      .post(`/api/lots/${lot.id}/uploads`)
      .attach('file', Buffer.from(plainCsv(4)), 'a.csv')
      .expect(403);
    await supplier.get(`/api/uploads/${id}`).expect(403);
    await supplier.get(`/api/lots/${lot.id}/readings`).expect(403);
    await Lot.update({ state: 'rejected' }, { where: { id: lot.id } });
    const closed = await technician
      .post(`/api/lots/${lot.id}/uploads`)
      .attach('file', Buffer.from(plainCsv(4)), 'a.csv')
      .expect(409);
    expect(closed.body).toMatchObject({ error: { code: 'lot.closed' } });
  });
});
