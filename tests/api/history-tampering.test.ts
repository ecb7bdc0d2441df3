import { execFile } from 'node:child_process';
import { mkdtempSync, readdirSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join, resolve } from 'node:path';
import { promisify } from 'node:util';
import { type Client } from 'pg';
import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest';
import { openDatabase } from '../../server/database/connection';
import { onDatabase, withClient } from '../../server/database/roles';
import { sealHash, verifyHistory } from '../../server/history/verify';
import { startApi, type Api } from '../support/api';
import { approvedPart, decided, inspectedLot, openHouse, type House } from '../support/lot-life';

/*
 * What an attacker may try, first as the application, whose role owns nothing, then as a superuser on a copy of the
 * database. Each copy is changed in one way, and the check has to name the first entry that is wrong.
 */
let api: Api;
let house: House;
/** The history before it is touched. */
let whole: Exported;
let filtered: Exported;
let verifierText: string;
beforeAll(async () => {
  api = await startApi();
  house = await openHouse(api);
  const part = await approvedPart(house);
  for (const decision of ['accept', 'hold', 'reject'] as const) {
    const lot = await inspectedLot(house, { partId: part.id });
    await decided(house.quality, lot.id, { decision });
  }
  await house.auditor.post('/api/history/checkpoints').send({}).expect(201);
  const get = (path: string) => house.auditor.get(path).expect(200);
  whole = (await get('/api/history/export')).body as Exported;
  filtered = (await get('/api/history/export?act=disposition.sign')).body as Exported;
  verifierText = (await get('/api/history/verifier.mjs')).text;
});
afterAll(() => api.close());

interface Exported {
  manifest: {
    count: number;
    complete: boolean;
    firstHash: string;
    lastHash: string;
    lastSequence: number;
    checkpoints: object[];
  };
  entries: {
    sequence: number;
    previousHash: string;
    hash: string;
    payload: string;
    actorName: string;
  }[];
}

const kept = ['history_entries', 'history_seals', 'history_checkpoints', 'signatures'];

describe('as the application', () => {
  const asApp = (sql: string) => withClient(api.testDatabase.appUrl, (client) => client.query(sql));

  it.each(kept)('%s holds rows that this could be tried on', async (table) => {
    const { rows } = await asApp(`SELECT count(*)::int AS n FROM ${table}`);
    expect(rows[0].n).toBeGreaterThan(0);
  });

  it.each(
    kept.flatMap((table) => [
      [`UPDATE ${table} SET ${table === 'history_seals' ? 'hash = hash' : 'id = id'}`],
      [`DELETE FROM ${table}`],
      [`TRUNCATE ${table} CASCADE`],
      [`ALTER TABLE ${table} DISABLE TRIGGER ALL`],
      [`ALTER TABLE ${table} OWNER TO quartzhold_app`],
      [`DROP TABLE ${table} CASCADE`],
      [`DROP TRIGGER ${table}_keep ON ${table}`],
      [`GRANT ALL ON ${table} TO quartzhold_app`],
    ]),
  )('%s is refused', async (sql) => {
    // A grant without the right to give it is a warning in PostgreSQL; that it gave nothing is asserted below.
    if (sql.startsWith('GRANT')) await asApp(sql).catch(() => undefined);
    else await expect(asApp(sql)).rejects.toThrow(/permission denied|must be owner/);
  });

  it.each([
    [
      `INSERT INTO history_seals (sequence, entry_id, previous_hash, hash) SELECT 9999, entry_id, hash, 'x' FROM history_seals LIMIT 1`,
    ],
    ['CREATE OR REPLACE FUNCTION seal_history() RETURNS trigger LANGUAGE sql AS $$ SELECT 1 $$'],
    ['CREATE OR REPLACE FUNCTION refuse_change() RETURNS trigger LANGUAGE sql AS $$ SELECT 1 $$'],
    ['DROP FUNCTION seal_history() CASCADE'],
    ['SET ROLE quartzhold_owner'],
    [`SET session_replication_role = 'replica'`],
  ])('%s is refused', async (sql) => {
    await expect(asApp(sql)).rejects.toThrow(/permission denied|must be owner|return type/);
  });

  it('has, by the catalogue, no more than it needs on any of them', async () => {
    const { rows } = await asApp(`
      SELECT relname AS name, has_table_privilege(c.oid, 'INSERT') AS add,
             has_table_privilege(c.oid, 'UPDATE') OR has_any_column_privilege(c.oid, 'UPDATE') AS change,
             has_table_privilege(c.oid, 'DELETE') AS remove, has_table_privilege(c.oid, 'TRUNCATE') AS empty,
             has_table_privilege(c.oid, 'TRIGGER') AS trigger, pg_get_userbyid(relowner) AS owner
      FROM pg_class c WHERE relnamespace = 'public'::regnamespace AND relkind IN ('r', 'p') ORDER BY relname`);
    const none = {
      change: false,
      remove: false,
      empty: false,
      trigger: false,
      owner: 'quartzhold_owner',
    };
    for (const name of [
      ...kept,
      'history_personal',
      'history_verifications',
      'upload_chunks',
      'readings',
    ])
      expect(rows.find((row) => row.name === name)).toEqual({
        name,
        add: name !== 'history_seals',
        ...none,
      });
    expect(rows.filter((row) => row.owner === 'quartzhold_app')).toEqual([]);
    expect(rows.filter((row) => row.empty || row.trigger)).toEqual([]);
  });

  it('has triggers on them that are switched on and that even the owner meets', async () => {
    const { rows } = await asApp(
      `SELECT tgrelid::regclass::text AS name, count(*)::int AS n FROM pg_trigger
       WHERE tgenabled = 'O' AND tgname LIKE '%\\_keep%' GROUP BY 1`,
    );
    for (const name of kept) expect(rows).toContainEqual({ name, n: 2 });
    await expect(
      withClient(api.testDatabase.ownerUrl, (owner) =>
        owner.query('TRUNCATE history_entries CASCADE'),
      ),
    ).rejects.toThrow(/append-only: TRUNCATE refused/);
  });
});

describe('as a superuser, on a copy', () => {
  let copy: string | null = null;
  afterEach(async () => {
    // The API goes on with its own database.
    openDatabase({ url: api.testDatabase.appUrl, poolMax: 5 });
    if (copy)
      await withClient(onDatabase(api.testDatabase.adminUrl, 'postgres'), (client) =>
        client.query(`DROP DATABASE "${copy}" WITH (FORCE)`),
      );
    copy = null;
  });

  /** Copies the database, changes the copy with every trigger off, and checks what is left. */
  async function tampered(change: (client: Client) => Promise<unknown>) {
    copy = `${api.testDatabase.name}_copy`;
    await api.database.close();
    await withClient(onDatabase(api.testDatabase.adminUrl, 'postgres'), async (client) => {
      await client.query(
        'SELECT pg_terminate_backend(pid) FROM pg_stat_activity WHERE datname = $1',
        [api.testDatabase.name],
      );
      await client.query(`CREATE DATABASE "${copy}" TEMPLATE "${api.testDatabase.name}"`);
    });
    const url = onDatabase(api.testDatabase.adminUrl, copy);
    await withClient(url, async (client) => {
      await client.query(`SET session_replication_role = 'replica'`);
      await change(client);
    });
    const opened = openDatabase({ url, poolMax: 2 });
    try {
      return await verifyHistory();
    } finally {
      await opened.close();
    }
  }
  const entryOf = (sequence: number) =>
    `(SELECT entry_id FROM history_seals WHERE sequence = ${sequence})`;

  it('finds nothing where nothing was changed', async () => {
    const result = await tampered(async () => undefined);
    expect(result).toMatchObject({ ok: true, firstBroken: null });
    expect(result.count).toBeGreaterThan(10);
    expect(result.checkpointsChecked).toBeGreaterThanOrEqual(2);
  });

  it.each<[string, number, string, (client: Client) => Promise<unknown>]>([
    [
      'altered content',
      5,
      'its content does not match its seal',
      (c) =>
        c.query(
          `UPDATE history_entries SET payload = replace(payload, '"reason":"', '"reason":"not ') WHERE id = ${entryOf(5)}`,
        ),
    ],
    [
      'an altered column beside sealed content',
      6,
      'its act as shown differs from what was sealed',
      (c) => c.query(`UPDATE history_entries SET act = 'lot.other' WHERE id = ${entryOf(6)}`),
    ],
    [
      'an altered time',
      6,
      'its time as shown differs from what was sealed',
      (c) =>
        c.query(`UPDATE history_entries SET at = at - interval '1 day' WHERE id = ${entryOf(6)}`),
    ],
    [
      'altered content under a seal made anew',
      8,
      'does not follow the entry before it',
      async (c) => {
        await c.query(
          `UPDATE history_entries SET payload = replace(payload, '"reason":"', '"reason":"not ') WHERE id = ${entryOf(7)}`,
        );
        await reseal(c, 7, 7);
      },
    ],
    [
      'a deleted entry',
      7,
      'entry 7 is missing',
      async (c) => {
        await c.query(`DELETE FROM history_entries WHERE id = ${entryOf(7)}`);
        await c.query('DELETE FROM history_seals WHERE sequence = 7');
      },
    ],
    [
      'deleted content under its seal',
      7,
      'its content is missing',
      (c) => c.query(`DELETE FROM history_entries WHERE id = ${entryOf(7)}`),
    ],
    [
      'a deleted entry whose gap was closed by counting anew',
      7,
      'does not follow the entry before it',
      async (c) => {
        await c.query('DELETE FROM history_seals WHERE sequence = 7');
        await c.query('UPDATE history_seals SET sequence = -(sequence - 1) WHERE sequence > 7');
        await c.query('UPDATE history_seals SET sequence = -sequence WHERE sequence < 0');
      },
    ],
    [
      'two entries that changed places',
      4,
      'its content does not match its seal',
      async (c) => {
        const { rows } = await c.query<{ entry_id: string }>(
          'SELECT entry_id FROM history_seals WHERE sequence IN (4, 5) ORDER BY sequence',
        );
        const put = (sequence: number, id: string) =>
          c.query('UPDATE history_seals SET entry_id = $2 WHERE sequence = $1', [sequence, id]);
        await put(4, '11111111-1111-4111-8111-111111111111');
        await put(5, rows[0]!.entry_id);
        await put(4, rows[1]!.entry_id);
      },
    ],
  ])('finds and names %s', async (_what, sequence, reason, change) => {
    expect(await tampered(change)).toMatchObject({ ok: false, firstBroken: { sequence, reason } });
  });

  it('finds an entry that was put in without a seal', async () => {
    const result = await tampered((c) =>
      c.query(
        `INSERT INTO history_entries SELECT gen_random_uuid(), at, act, actor_id, record_type, record_id, lot_id, payload FROM history_entries LIMIT 1`,
      ),
    );
    expect(result).toMatchObject({
      ok: false,
      firstBroken: { reason: 'an entry was put in without a seal' },
    });
  });

  const cutTail = async (c: Client) => {
    await c.query(
      'DELETE FROM history_entries WHERE id IN (SELECT entry_id FROM history_seals WHERE sequence > 9)',
    );
    await c.query('DELETE FROM history_seals WHERE sequence > 9');
  };

  it('finds a tail cut off, by the checkpoint in the database', async () => {
    const result = await tampered(cutTail);
    expect(result).toMatchObject({
      ok: false,
      firstBroken: {
        sequence: 10,
        reason: expect.stringMatching(/9 are left: the newest were removed/),
      },
    });
  });

  it('finds a tail cut off together with its checkpoints, by the file outside the database', async () => {
    const result = await tampered(async (c) => {
      await cutTail(c);
      await c.query('DELETE FROM history_checkpoints');
    });
    expect(result).toMatchObject({ ok: false, firstBroken: { sequence: 10 } });
  });

  it('finds a whole history written anew from one entry on, by the file outside the database', async () => {
    const result = await tampered(async (c) => {
      await c.query(
        `UPDATE history_entries SET payload = replace(payload, '"reason":"', '"reason":"not ') WHERE id = ${entryOf(3)}`,
      );
      await reseal(c, 3);
      await c.query('DELETE FROM history_checkpoints');
    });
    expect(result).toMatchObject({
      ok: false,
      firstBroken: { reason: 'differs from the checkpoint made when it was the newest' },
    });
  });

  it('finds a checkpoint that was signed by nobody', async () => {
    const result = await tampered((c) =>
      c.query(`UPDATE history_checkpoints SET signature = encode(sha512('forged'), 'base64')`),
    );
    expect(result).toMatchObject({
      ok: false,
      firstBroken: { reason: 'its checkpoint carries a signature that does not fit' },
    });
  });
});

/** Seals entries anew as an attacker would who knows how the chain is made. */
async function reseal(client: Client, from: number, to = Number.MAX_SAFE_INTEGER) {
  const { rows } = await client.query<{ sequence: string; payload: string }>(
    'SELECT s.sequence, e.payload FROM history_seals s JOIN history_entries e ON e.id = s.entry_id WHERE s.sequence BETWEEN $1 AND $2 ORDER BY 1',
    [from, to],
  );
  const { rows: before } = await client.query<{ hash: string }>(
    'SELECT hash FROM history_seals WHERE sequence = $1',
    [from - 1],
  );
  let previous = before[0]!.hash;
  for (const { sequence, payload } of rows) {
    const hash = sealHash(sequence, previous, payload);
    await client.query(
      'UPDATE history_seals SET previous_hash = $2, hash = $3 WHERE sequence = $1',
      [sequence, previous, hash],
    );
    previous = hash;
  }
}

describe('the stand-alone verifier', () => {
  const folder = mkdtempSync(join(tmpdir(), 'quartzhold-verifier-'));
  const run = async (content: unknown, checkpoints: string[] = []) => {
    const file = join(folder, 'export.json');
    writeFileSync(file, typeof content === 'string' ? content : JSON.stringify(content));
    return promisify(execFile)(
      process.execPath,
      [resolve('server/history/verifier.mjs'), file, ...checkpoints],
      {
        cwd: folder,
      },
    ).then(
      ({ stdout }) => ({ code: 0, said: stdout }),
      (error: { code: number; stdout: string; stderr: string }) => ({
        code: error.code,
        said: error.stdout + error.stderr,
      }),
    );
  };
  const files = () =>
    readdirSync(api.config.CHECKPOINT_FOLDER).map((name) =>
      join(api.config.CHECKPOINT_FOLDER, name),
    );
  const changed = (change: (copy: Exported) => void): Exported => {
    const copy = structuredClone(whole);
    change(copy);
    return copy;
  };

  it('passes a good export with its checkpoint file', async () => {
    const { code, said } = await run(whole, files());
    expect(said).toMatch(/OK: \d+ entries hold together, none missing between them/);
    expect(said).toMatch(/2 checkpoints agree/);
    expect(code).toBe(0);
  });

  it('passes a filtered export and says that it is one', async () => {
    expect(filtered.entries).toHaveLength(3);
    const { code, said } = await run(filtered, files());
    expect([code, said]).toEqual([0, expect.stringMatching(/filtered export/)]);
  });

  it.each<[string, RegExp, (copy: Exported) => void]>([
    [
      'altered content',
      /BROKEN at entry 5: its content/,
      (c) => (c.entries[4]!.payload = c.entries[4]!.payload.replace('"act":"', '"act":"x')),
    ],
    [
      'an altered hash',
      /BROKEN at entry 5: its content/,
      (c) => (c.entries[4]!.hash = 'f'.repeat(64)),
    ],
    ['a removed entry', /BROKEN at entry 6: missing/, (c) => void c.entries.splice(5, 1)],
    [
      'a removed entry with a mended manifest',
      /BROKEN at entry 6: missing/,
      (c) => {
        c.entries.splice(5, 1);
        c.manifest.count -= 1;
      },
    ],
    [
      'a removed entry in an export said to be filtered',
      /the manifest counts/,
      (c) => {
        c.entries.splice(5, 1);
        c.manifest.complete = false;
      },
    ],
    [
      'an entry put in twice',
      /BROKEN at entry 5: out of order or twice/,
      (c) => void c.entries.splice(5, 0, c.entries[4]!),
    ],
    [
      'two entries that changed places',
      /BROKEN at entry \d+: (missing|out of order)/,
      (c) => void c.entries.splice(3, 2, c.entries[4]!, c.entries[3]!),
    ],
    [
      'a cut tail, mended manifest and all, by the checkpoint file',
      /a checkpoint counted \d+ entries: the newest are missing/,
      (c) => {
        c.entries.splice(-4);
        c.manifest.count = c.entries.length;
        c.manifest.lastHash = c.entries.at(-1)!.hash;
        c.manifest.checkpoints = [];
      },
    ],
    [
      'everything written anew, by the checkpoint file',
      /differs from a checkpoint/,
      (c) => {
        let previous = c.entries[1]!.hash;
        c.entries.slice(2).forEach((entry) => {
          entry.payload = entry.payload.replace('"reason":"', '"reason":"not ');
          entry.previousHash = previous;
          previous = entry.hash = sealHash(entry.sequence, previous, entry.payload);
        });
        c.manifest.lastHash = previous;
        c.manifest.checkpoints = [];
      },
    ],
    [
      'a forged checkpoint',
      /carries a signature that does not fit/,
      (c) => {
        (c.manifest.checkpoints[0] as { head: string }).head = 'a'.repeat(64);
      },
    ],
  ])('finds and names %s', async (_what, said, change) => {
    const outcome = await run(changed(change), files());
    expect(outcome.said).toMatch(said);
    expect(outcome.code).toBe(1);
  });

  it('says so when the file is no export', async () => {
    for (const content of ['', 'not JSON', '{}', '[]'])
      expect(await run(content)).toMatchObject({
        code: 2,
        said: expect.stringMatching(/is not an export/),
      });
  });

  it('needs nothing of the server', async () => {
    const imports = [...verifierText.matchAll(/from '([^']+)'/g)].map((match) => match[1]);
    expect(imports.length).toBeGreaterThan(0);
    expect(imports.every((name) => name!.startsWith('node:'))).toBe(true);
  });
});

describe('what is inside the chain', () => {
  it('names no person and no address', () => {
    const people = Object.values(api.people).flatMap(({ name, email }) => [name, email]);
    for (const { payload, sequence } of whole.entries)
      for (const personal of people)
        expect([sequence, payload.includes(personal)]).toEqual([sequence, false]);
    expect(whole.entries.some((entry) => entry.actorName === 'Quentin Quality')).toBe(true);
  });
});
