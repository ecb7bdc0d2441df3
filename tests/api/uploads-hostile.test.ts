import { readdirSync } from 'node:fs';
import { createServer, request as httpRequest, type Server } from 'node:http';
import { type AddressInfo } from 'node:net';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { startWorker } from '../../server/jobs/worker';
import { claimUpload } from '../../server/ingest/lease';
import { loadUpload } from '../../server/services/uploads/load-upload';
import { startApi, type Agent, type Api } from '../support/api';
import { someLot } from '../support/inspection';
import { ended, plainCsv, plainHeader, uploadText } from '../support/readings';

let api: Api;
let technician: Agent;
let server: Server;
let port: number;
let cookie: string;

beforeAll(async () => {
  api = await startApi({ GREATEST_UPLOAD_BYTES: 3 * 1024 * 1024 });
  technician = await api.agentFor('technician');
  server = createServer(api.app);
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  port = (server.address() as AddressInfo).port;
  const signedIn = await api
    .stranger()
    .post('/api/session')
    .send({ email: 'technician@quartzhold.test', password: 'a heron waits on the weir' })
    .expect(200);
  cookie = (signedIn.headers['set-cookie'] as unknown as string[])
    .map((item) => item.split(';')[0])
    .join('; ');
});
afterAll(async () => {
  server.closeAllConnections();
  await new Promise((resolve) => server.close(resolve));
  await api.close();
});

const number = async (sql: string, values: unknown[] = []): Promise<number> =>
  Number(Object.values((await api.database.pool.query(sql, values)).rows[0] as object)[0]);

async function eventually(look: () => Promise<boolean> | boolean): Promise<void> {
  for (let tries = 0; tries < 200; tries += 1) {
    if (await look()) return;
    await new Promise((resolve) => setTimeout(resolve, 25));
  }
  throw new Error('It did not happen.');
}

function send(lotId: string, length: number) {
  const boundary = 'cut-short';
  const outgoing = httpRequest({
    host: '127.0.0.1',
    port,
    method: 'POST',
    path: `/api/lots/${lotId}/uploads`,
    headers: {
      'X-Quartzhold': '1',
      Cookie: cookie,
      'Content-Type': `multipart/form-data; boundary=${boundary}`,
      'Content-Length': length,
    },
  });
  outgoing.on('error', () => undefined);
  outgoing.write(
    `--${boundary}\r\nContent-Disposition: form-data; name="file"; filename="a.csv"\r\n\r\n${plainHeader}\n`,
  );
  return outgoing;
}

describe('an upload that breaks off', () => {
  it('leaves no row, no bytes, no open transaction and no descriptor', async () => {
    const lot = await someLot(api);
    const descriptors = () => readdirSync('/proc/self/fd').length;
    const open = () =>
      number(
        `SELECT count(*) FROM pg_stat_activity WHERE datname = current_database() AND state LIKE 'idle in transaction%'`,
      );
    // The pools open their connections once; only what stays beyond them is a leak.
    for (let round = 0; round < 2; round += 1) {
      await Promise.all(
        Array.from({ length: 6 }, async () => {
          const outgoing = send(lot.id, 2_000_000);
          outgoing.write(plainCsv(5000));
          await new Promise((resolve) => setTimeout(resolve, 150));
          outgoing.destroy();
        }),
      );
      await eventually(async () => (await open()) === 0);
    }
    const before = descriptors();
    for (let i = 0; i < 10; i += 1) {
      const outgoing = send(lot.id, 2_000_000);
      outgoing.write(plainCsv(2000));
      await new Promise((resolve) => setTimeout(resolve, 40));
      outgoing.destroy();
    }
    await eventually(async () => (await open()) === 0);
    await eventually(() => descriptors() <= before + 2);
    expect(await number('SELECT count(*) FROM uploads')).toBe(0);
    expect(await number('SELECT count(*) FROM upload_chunks')).toBe(0);
    expect(await number("SELECT count(*) FROM history_entries WHERE act LIKE 'upload.%'")).toBe(0);
    expect(await number(`SELECT count(*) FROM jobs.job WHERE name = 'ingest'`)).toBe(0);
  });

  it('is told when it is too large, before and while it is read', async () => {
    const lot = await someLot(api);
    const answer = await technician
      .post(`/api/lots/${lot.id}/uploads`)
      .attach('file', Buffer.alloc(4 * 1024 * 1024, 'x'), 'large.csv');
    expect(answer.status).toBe(413);
    expect(answer.body).toMatchObject({ error: { code: 'upload.too_large' } });
    expect(await number('SELECT count(*) FROM uploads')).toBe(0);
  });

  it('without a file, or with a file under another name, is told so', async () => {
    const lot = await someLot(api);
    const none = await technician
      .post(`/api/lots/${lot.id}/uploads`)
      .field('benchId', '')
      .expect(400);
    expect((none.body as { error: { message: string } }).error.message).not.toBe('');
    await technician
      .post(`/api/lots/${lot.id}/uploads`)
      .attach('other', Buffer.from(plainCsv(1)), 'a.csv')
      .expect(400);
    await technician
      .post(`/api/lots/${lot.id}/uploads`)
      .field('mapping', '{"columns": "x"}')
      .attach('file', Buffer.from(plainCsv(1)), 'a.csv')
      .expect(400);
    expect(await number('SELECT count(*) FROM uploads')).toBe(0);
  });
});

describe('two at once', () => {
  it('the same file twice into one lot: one is taken', async () => {
    const lot = await someLot(api);
    const content = plainCsv(50);
    const answers = await Promise.all(
      [1, 2, 3].map(() =>
        technician
          .post(`/api/lots/${lot.id}/uploads`)
          .attach('file', Buffer.from(content), 'a.csv'),
      ),
    );
    expect(answers.map((answer) => answer.status).sort()).toEqual([202, 409, 409]);
  });

  it('two files of one lot read by two workers know each other', async () => {
    const lot = await someLot(api);
    const ids = [
      await uploadText(technician, lot.id, plainCsv(400)),
      await uploadText(technician, lot.id, plainCsv(400, 201)),
    ];
    await Promise.all(ids.map((id) => loadUpload(id)));
    expect(
      await number(
        `SELECT count(*) FROM readings r JOIN uploads u ON u.number = r.upload_number WHERE u.lot_id = $1`,
        [lot.id],
      ),
    ).toBe(600);
    expect(await number('SELECT sum(rows_refused) FROM uploads WHERE lot_id = $1', [lot.id])).toBe(
      200,
    );
  });
});

describe('a worker that dies', () => {
  it('is followed by another once its lease has lapsed, and nothing is there twice', async () => {
    const lot = await someLot(api);
    const id = await uploadText(technician, lot.id, plainCsv(30));
    const token = await claimUpload(api.database.pool, id);
    expect(token).not.toBeNull();
    expect(await claimUpload(api.database.pool, id)).toBeNull();
    await api.database.pool.query(
      `UPDATE uploads SET lease_until = now() - interval '1 second' WHERE id = $1`,
      [id],
    );
    const worker = await startWorker();
    const upload = await ended(technician, id);
    await worker.stop();
    expect(upload).toMatchObject({ state: 'done', rowsTaken: 30 });
    expect(
      await number(
        `SELECT count(*) FROM readings r JOIN uploads u ON u.number = r.upload_number WHERE u.id = $1`,
        [id],
      ),
    ).toBe(30);
  });

  it('whose lease was taken by another commits nothing', async () => {
    const lot = await someLot(api);
    const id = await uploadText(technician, lot.id, plainCsv(30));
    // Holds the first load back before it can begin, until its lease is somebody else's.
    const blocker = await api.database.pool.connect();
    await blocker.query('BEGIN');
    await blocker.query('SELECT pg_advisory_xact_lock(hashtextextended($1, 7172618))', [lot.id]);
    const first = loadUpload(id);
    await eventually(
      async () =>
        (await number(`SELECT count(*) FROM uploads WHERE id = $1 AND state = 'running'`, [id])) ===
        1,
    );
    await api.database.pool.query(
      'UPDATE uploads SET lease_token = gen_random_uuid() WHERE id = $1',
      [id],
    );
    await blocker.query('COMMIT');
    blocker.release();
    await first;
    expect(
      await number(
        `SELECT count(*) FROM readings r JOIN uploads u ON u.number = r.upload_number WHERE u.id = $1`,
        [id],
      ),
    ).toBe(0);
    expect(
      await number(`SELECT count(*) FROM uploads WHERE id = $1 AND state = 'running'`, [id]),
    ).toBe(1);
  });

  it('gives up after three beginnings and says so', async () => {
    const lot = await someLot(api);
    const id = await uploadText(technician, lot.id, plainCsv(3));
    await api.database.pool.query('UPDATE uploads SET attempts = 3 WHERE id = $1', [id]);
    await loadUpload(id);
    const upload = await ended(technician, id);
    expect(upload).toMatchObject({ state: 'failed', failure: { code: 'upload.given_up' } });
  });
});

describe('a file that cannot be loaded', () => {
  it('fails whole, keeps its bytes and its reason, and may come again', async () => {
    const lot = await someLot(api);
    const content = Buffer.concat([
      Buffer.from(plainCsv(20_000)),
      Buffer.from('Pr\xfcf,25,16000001,\n', 'latin1'),
    ]);
    const id = await uploadText(technician, lot.id, content);
    await loadUpload(id);
    const upload = await ended(technician, id);
    expect(upload).toMatchObject({
      state: 'failed',
      rowsInFile: 0,
      failure: { code: 'file.encoding' },
    });
    expect(
      await number(
        `SELECT count(*) FROM readings r JOIN uploads u ON u.number = r.upload_number WHERE u.id = $1`,
        [id],
      ),
    ).toBe(0);
    await uploadText(technician, lot.id, content, {
      mapping: JSON.stringify({
        encoding: 'windows-1252',
        columns: [
          { target: 'serial' },
          { target: 'temperature' },
          { target: 'frequency', unit: 'Hz' },
          { target: 'measuredAt' },
        ],
      }),
    });
  });
});

describe('progress', () => {
  it('is streamed as events until the upload has ended', async () => {
    const lot = await someLot(api);
    const id = await uploadText(technician, lot.id, plainCsv(20_000));
    const events: { state: string; progress: { stage: string } }[] = [];
    const stream = new Promise<void>((resolve, reject) => {
      const asked = httpRequest({
        host: '127.0.0.1',
        port,
        path: `/api/uploads/${id}/events`,
        headers: { Cookie: cookie },
      });
      asked.on('error', reject);
      asked.on('response', (response) => {
        expect(response.headers['content-type']).toMatch(/^text\/event-stream/);
        let text = '';
        response.setEncoding('utf8');
        response.on('data', (piece: string) => {
          text += piece;
          for (let end = text.indexOf('\n\n'); end !== -1; end = text.indexOf('\n\n')) {
            const data = /^data: (.*)$/m.exec(text.slice(0, end));
            if (data) events.push(JSON.parse(data[1]!) as (typeof events)[0]);
            text = text.slice(end + 2);
          }
        });
        response.on('end', resolve);
      });
      asked.end();
    });
    await eventually(() => events.length > 0);
    expect(events[0]).toMatchObject({ state: 'queued', progress: { stage: 'waiting' } });
    await loadUpload(id);
    await stream;
    expect(events.at(-1)).toMatchObject({ state: 'done', progress: { stage: 'finished' } });
  });
});
