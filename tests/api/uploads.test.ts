import { createHash } from 'node:crypto';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { type Bench } from '../../server/models';
import { startWorker } from '../../server/jobs/worker';
import { startApi, type Agent, type Api } from '../support/api';
import { someBench, someLot } from '../support/inspection';
import { ended, plainCsv, plainHeader, uploadText } from '../support/readings';

let api: Api;
let worker: { stop(): Promise<void> };
let technician: Agent;
let bench: Bench;

beforeAll(async () => {
  api = await startApi({ LOG_LEVEL: (process.env.TEST_LOG ?? 'silent') as 'silent' });
  worker = await startWorker();
  technician = await api.agentFor('technician');
  bench = await someBench({ usual: true });
});
afterAll(async () => {
  await worker.stop();
  await api.close();
});

const scalar = async (sql: string, values: unknown[] = []): Promise<unknown> =>
  Object.values((await api.database.pool.query(sql, values)).rows[0] as object)[0];

describe('uploading a plain file', () => {
  it('loads every row, keeps the bytes and analyses the lot', async () => {
    const lot = await someLot(api);
    const content = plainCsv(200);
    const id = await uploadText(technician, lot.id, content);
    const upload = await ended(technician, id);
    expect(upload).toMatchObject({
      state: 'done',
      rowsInFile: 200,
      rowsTaken: 200,
      rowsRefused: 0,
      unitsCount: 200,
      sha256: createHash('sha256').update(content).digest('hex'),
      bench: { id: bench.id },
      failure: null,
    });
    const analysis = await technician.get(`/api/lots/${lot.id}/analysis`).expect(200);
    expect(analysis.body).toMatchObject({ units: 200 });
    const stored = await scalar(
      `SELECT string_agg(bytes, ''::bytea ORDER BY part) FROM upload_chunks WHERE upload_id = $1`,
      [id],
    );
    expect((stored as Buffer).equals(Buffer.from(content))).toBe(true);
  });

  it('keeps frequencies to the last digit and serials with their zeros', async () => {
    const lot = await someLot(api, { criteria: { nominalFrequencyHz: '10000000' } });
    const id = await uploadText(
      technician,
      lot.id,
      `${plainHeader}\n007,-40,10000000.126856699585915,2015-06-01T00:00:00.123456+02:00\n7,,9999999.10,\n`,
    );
    expect(await ended(technician, id)).toMatchObject({ rowsTaken: 2, unitsCount: 2 });
    const { rows } = await api.database.pool.query(
      `SELECT r.serial, r.frequency_hz, r.temperature_c, r.file_line, (extract(epoch FROM measured_at) * 1000000)::bigint AS micros
       FROM readings r JOIN uploads u ON u.number = r.upload_number WHERE u.id = $1 ORDER BY file_line`,
      [id],
    );
    expect(rows).toEqual([
      {
        serial: '007',
        frequency_hz: '10000000.126856699585915',
        temperature_c: '-40',
        file_line: 2,
        micros: String(Date.UTC(2015, 4, 31, 22, 0, 0) * 1000 + 123456),
      },
      {
        serial: '7',
        frequency_hz: '9999999.10',
        temperature_c: null,
        file_line: 3,
        micros: null,
      },
    ]);
  });

  it('refuses bad rows one by one and adds up', async () => {
    const lot = await someLot(api);
    const id = await uploadText(
      technician,
      lot.id,
      [
        plainHeader,
        'A1,25,16000001,',
        'A2,25,NaN,',
        'A3,25,1e400,',
        ',25,16000001,',
        'A5,25,-16000000,',
        'A6,25,,',
        '',
        'A7,warm,16000001,',
        'A8,25,16000001,yesterday',
        'A9,25,16000001',
        'A1,25.0,16000002,',
        'A1,85,16000002,',
        '"A10,25,16000003,',
        'A11,25,16000003,',
      ].join('\n'),
    );
    expect(await ended(technician, id)).toMatchObject({
      state: 'done',
      rowsInFile: 13,
      rowsTaken: 3,
      rowsRefused: 10,
    });
    const { rows } = await api.database.pool.query(
      `SELECT file_line, rule, column_name, text_found FROM refused_rows r JOIN uploads u ON u.number = r.upload_number WHERE u.id = $1 ORDER BY file_line`,
      [id],
    );
    expect(rows.map((row) => [row.file_line, row.rule, row.column_name])).toEqual([
      [3, 'number.not_finite', 'frequency_hz'],
      [4, 'number.out_of_range', 'frequency_hz'],
      [5, 'serial.missing', 'serial'],
      [6, 'frequency.not_positive', 'frequency_hz'],
      [7, 'frequency.missing', 'frequency_hz'],
      [9, 'number.unreadable', 'temperature_c'],
      [10, 'time.not_iso', 'measured_at'],
      [11, 'columns', ''],
      [12, 'duplicate', 'serial'],
      [14, 'quotes', ''],
    ]);
  });

  it('hashes the readings so that the hash can be made again from the table', async () => {
    const lot = await someLot(api);
    const id = await uploadText(technician, lot.id, plainCsv(300));
    await ended(technician, id);
    const number = await scalar('SELECT number FROM uploads WHERE id = $1', [id]);
    const { to } = await import('pg-copy-streams');
    const client = await api.database.pool.connect();
    const hash = createHash('sha256');
    const rows: Buffer[] = [];
    for await (const piece of client.query(
      to(
        `COPY (SELECT upload_number, file_line, serial, temperature_c, frequency_hz, measured_at FROM readings WHERE upload_number = ${Number(number)} ORDER BY file_line, file_column) TO STDOUT (FORMAT binary)`,
      ),
    ) as AsyncIterable<Buffer>)
      rows.push(piece);
    client.release();
    const all = Buffer.concat(rows);
    hash.update(all.subarray(19, all.length - 2));
    expect(await scalar('SELECT readings_sha256 FROM uploads WHERE id = $1', [id])).toBe(
      hash.digest('hex'),
    );
  });
});

describe('the same file again', () => {
  it('is refused in the same lot and warned of in another', async () => {
    const lot = await someLot(api);
    const other = await someLot(api);
    const content = plainCsv(5);
    await ended(technician, await uploadText(technician, lot.id, content));
    const again = await technician
      .post(`/api/lots/${lot.id}/uploads`)
      .attach('file', Buffer.from(content), 'copy.csv')
      .expect(409);
    expect(again.body).toMatchObject({ error: { code: 'upload.same_file' } });
    expect((again.body as { error: { message: string } }).error.message).toContain(
      'Tilda Technician',
    );
    const upload = await ended(technician, await uploadText(technician, other.id, content));
    expect(upload.warnings.map((warning) => warning.code)).toEqual(['file.other_lot']);
    expect(await scalar('SELECT count(*)::int FROM uploads WHERE lot_id = $1', [lot.id])).toBe(1);
  });

  it('recognises units of earlier uploads of the lot by serial and temperature', async () => {
    const lot = await someLot(api);
    await ended(technician, await uploadText(technician, lot.id, plainCsv(10)));
    const upload = await ended(technician, await uploadText(technician, lot.id, plainCsv(10, 6)));
    expect(upload).toMatchObject({ rowsInFile: 10, rowsTaken: 5, rowsRefused: 5, unitsCount: 10 });
    expect(upload.warnings.map((warning) => warning.code)).toEqual(['serial.overlap']);
  });

  it('takes repeat readings where the part says so', async () => {
    const lot = await someLot(api, { criteria: { repeatReadings: 'repeat' } });
    const content = `${plainHeader}\nA,25,16000001,\nA,25,16000002,\n`;
    const upload = await ended(technician, await uploadText(technician, lot.id, content));
    expect(upload).toMatchObject({ rowsTaken: 2, unitsCount: 1 });
  });
});
