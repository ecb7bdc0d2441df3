import { readFileSync } from 'node:fs';
import { gzipSync } from 'node:zlib';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { type UploadCheck } from '../../shared/contract/uploads';
import { startWorker } from '../../server/jobs/worker';
import { startApi, type Agent, type Api } from '../support/api';
import { someBench, someLot } from '../support/inspection';
import { ended, plainCsv, uploadText } from '../support/readings';

let api: Api;
let worker: { stop(): Promise<void> };
let technician: Agent;

beforeAll(async () => {
  api = await startApi();
  worker = await startWorker();
  technician = await api.agentFor('technician');
  await someBench({ usual: true, chamberLowC: -55, chamberHighC: 125 });
});
afterAll(async () => {
  await worker.stop();
  await api.close();
});

async function check(
  lotId: string,
  content: string | Buffer,
  fields: Record<string, string> = {},
): Promise<UploadCheck> {
  let request = technician.post(`/api/lots/${lotId}/upload-checks`);
  for (const [name, value] of Object.entries(fields)) request = request.field(name, value);
  const answer = await request.attach('file', Buffer.from(content), 'file.csv');
  expect(answer.body, JSON.stringify(answer.body)).toHaveProperty('mapping');
  return answer.body as UploadCheck;
}

async function refusedCode(lotId: string, content: string | Buffer): Promise<string> {
  const answer = await technician
    .post(`/api/lots/${lotId}/upload-checks`)
    .attach('file', Buffer.from(content), 'readings.csv')
    .expect(400);
  return (answer.body as { error: { code: string } }).error.code;
}

describe('looking at a file before anything is written', () => {
  it('knows the plain form and writes nothing', async () => {
    const lot = await someLot(api);
    const found = await check(lot.id, plainCsv(40));
    expect(found.mapping).toMatchObject({ encoding: 'utf-8', delimiter: ',', headerRow: true });
    expect(found.mapping.columns.map((column) => column.target)).toEqual([
      'serial',
      'temperature',
      'frequency',
      'measuredAt',
    ]);
    expect(found).toMatchObject({ compression: 'none', questions: [], warnings: [], firstLine: 2 });
    expect(found.rows).toHaveLength(20);
    const { rows } = await api.database.pool.query('SELECT count(*)::int AS n FROM uploads');
    expect(rows[0].n).toBe(0);
  });

  it('shows what a value in MHz comes to', async () => {
    const lot = await someLot(api, { criteria: { nominalFrequencyHz: '10000000' } });
    const found = await check(
      lot.id,
      'S/N;Freq [MHz];T [°C]\n0001;9,999987;25,0\n0002;10,000001;25,0\n',
    );
    expect(found.mapping).toMatchObject({ delimiter: ';', decimalSign: ',' });
    expect(found.columns[1]).toMatchObject({ target: { target: 'frequency', unit: 'MHz' } });
    expect(found.columns[1]!.example.replaceAll('\u00a0', ' ')).toBe('9.999987 MHz = −1.3 ppm');
  });

  it('asks what “1.234” means instead of guessing', async () => {
    const lot = await someLot(api);
    const found = await check(lot.id, 'serial;offset_ppm\nA;1.234\nB;2.345\n');
    expect(found.questions.map((question) => question.field)).toEqual(['decimalSign']);
    const answer = await technician
      .post(`/api/lots/${lot.id}/uploads`)
      .attach('file', Buffer.from('serial;offset_ppm\nA;1.234\nB;2.345\n'), 'a.csv')
      .expect(400);
    expect(answer.body).toMatchObject({ error: { code: 'upload.mapping_needed' } });
  });

  it('asks for the unit when neither heading nor values tell', async () => {
    const lot = await someLot(api);
    const found = await check(lot.id, 'serial,offset\nA,1.5\nB,2.25\n');
    expect(found.questions.map((question) => question.field)).toEqual(['unit']);
  });

  it('asks for the encoding of what is not UTF-8, and reads UTF-16 and gzip by themselves', async () => {
    const lot = await someLot(api);
    const text = 'serial,frequency_hz,note\nA,16000001.5,grün\n';
    const latin = await check(lot.id, Buffer.from(text, 'latin1'));
    expect(latin.questions.map((question) => question.field)).toEqual(['encoding']);
    expect(latin.rows[0]).toEqual(['A', '16000001.5', 'grün']);
    const wide = await check(lot.id, Buffer.from(`\ufeff${text}`, 'utf16le'));
    expect(wide.mapping.encoding).toBe('utf-16le');
    expect(wide.questions).toEqual([]);
    const packed = await check(lot.id, gzipSync(plainCsv(100_000)).subarray(0, 200_000));
    expect(packed.compression).toBe('gzip');
    expect(packed.rows).toHaveLength(20);
  });

  it('recognises a column per temperature', async () => {
    const lot = await someLot(api);
    const found = await check(
      lot.id,
      'unit,f_hz @ -40 °C,f_hz @ 25 °C,f_hz @ 85 °C\nA,15999990,16000001,16000005\n',
    );
    expect(found.mapping.shape).toBe('unit_per_row');
    expect(found.mapping.columns.slice(1)).toEqual(
      [-40, 25, 85].map((temperatureC) => ({ target: 'frequency', unit: 'Hz', temperatureC })),
    );
  });

  it('recognises a bare column of frequencies', async () => {
    const lot = await someLot(api);
    const found = await check(lot.id, '16000001.5\n16000002.5\n');
    expect(found.mapping).toMatchObject({ headerRow: false });
    expect(found.mapping.columns).toEqual([
      { target: 'frequency', unit: 'Hz', temperatureC: null },
    ]);
  });

  it('doubts a wrong nominal and a temperature outside the chamber', async () => {
    const lot = await someLot(api);
    const found = await check(
      lot.id,
      'serial,temperature_c,frequency_hz,measured_at\nA,300,10000000,\n',
    );
    expect(found.warnings.map((warning) => warning.code)).toEqual([
      'temperature.outside_chamber',
      'frequency.implausible',
    ]);
  });

  it('refuses by content what only looks like CSV by name', async () => {
    const lot = await someLot(api);
    expect(await refusedCode(lot.id, Buffer.from('PK\u0003\u0004abcdefgh', 'latin1'))).toBe(
      'file.not_text',
    );
    expect(
      await refusedCode(lot.id, Buffer.from([0xd0, 0xcf, 0x11, 0xe0, 0xa1, 0xb1, 1, 2, 3])),
    ).toBe('file.not_text');
    expect(await refusedCode(lot.id, Buffer.alloc(5000))).toBe('file.not_text');
    expect(await refusedCode(lot.id, Buffer.alloc(0))).toBe('upload.empty');
    expect(
      await refusedCode(
        lot.id,
        Buffer.concat([Buffer.from([0x1f, 0x8b]), Buffer.from('rubbish rubbish')]),
      ),
    ).toBe('file.gzip_damaged');
  });
});

describe('saved mappings', () => {
  it('are applied by themselves to the next file with the same headings, and shown', async () => {
    const lot = await someLot(api);
    const file = (n: number) => `Bauteil;Abweichung\nK${n};1,5\nK${n + 1};-2,25\n`;
    const mapping = {
      delimiter: ';',
      decimalSign: ',',
      columns: [{ target: 'serial' }, { target: 'frequency', unit: 'ppm' }],
    };
    const id = await uploadText(technician, lot.id, file(1), {
      mapping: JSON.stringify(mapping),
      rememberMapping: 'true',
    });
    expect(await ended(technician, id)).toMatchObject({ state: 'done', rowsTaken: 2 });
    const found = await check(lot.id, file(3));
    expect(found.savedMapping).toMatchObject({ version: 1, savedBy: 'Tilda Technician' });
    expect(found.mapping).toMatchObject({ ...mapping, columns: expect.anything() });
    const next = await ended(technician, await uploadText(technician, lot.id, file(3)));
    expect(next).toMatchObject({ state: 'done', rowsTaken: 2 });
    const { rows } = await api.database.pool.query(
      `SELECT frequency_hz FROM readings r JOIN uploads u ON u.number = r.upload_number WHERE u.id = $1 ORDER BY file_line`,
      [next.id],
    );
    expect(rows.map((row) => Number(row.frequency_hz))).toEqual([16000024, 15999964]);
  });
});

describe('real records', () => {
  it('the oven oscillator loads as a time series', async () => {
    const content = readFileSync('tests/records/ocxo-10MHz-1s-first2000.csv');
    const lot = await someLot(api, { criteria: { nominalFrequencyHz: '10000000' } });
    const found = await check(lot.id, content);
    expect(found.mapping.shape).toBe('time_series');
    expect(found.mapping.columns.map((column) => column.target)).toEqual([
      'ignore',
      'elapsedSeconds',
      'frequency',
    ]);
    expect(found.questions).toEqual([]);
    const mapping = { ...found.mapping, serial: 'OCXO-1', startedAt: '2015-06-01T00:00:00Z' };
    const id = await uploadText(technician, lot.id, content, { mapping: JSON.stringify(mapping) });
    expect(await ended(technician, id)).toMatchObject({
      state: 'done',
      rowsTaken: 2000,
      rowsRefused: 0,
      unitsCount: 1,
      warnings: [],
    });
    const { rows } = await api.database.pool.query(
      `SELECT frequency_hz, measured_at FROM readings r JOIN uploads u ON u.number = r.upload_number WHERE u.id = $1 ORDER BY file_line LIMIT 1`,
      [id],
    );
    expect(rows[0]).toEqual({
      frequency_hz: '10000000.126856699585915',
      measured_at: new Date('2015-06-01T00:00:00Z'),
    });
  });

  it('the clock modules load by their offset in ppm', async () => {
    const content = readFileSync('tests/records/rtc-units-initial-offset-ppm.csv');
    const lot = await someLot(api, { criteria: { nominalFrequencyHz: '32768' } });
    const found = await check(lot.id, content);
    expect(found.columns.map((column) => column.target)).toEqual([
      { target: 'serial' },
      { target: 'frequency', unit: 'ppm', temperatureC: null },
    ]);
    const upload = await ended(technician, await uploadText(technician, lot.id, content));
    expect(upload).toMatchObject({ state: 'done', rowsTaken: 14, unitsCount: 14 });
    const listed = await technician.get(`/api/lots/${lot.id}/readings?limit=1`).expect(200);
    expect((listed.body as { items: unknown[] }).items[0]).toMatchObject({
      serial: 'U00',
      frequencyHz: '32768.5963776',
      offsetPpm: 18.2,
      verdict: 'nonconforming',
    });
  });
});
