import { createHash, randomBytes } from 'node:crypto';
import { readdirSync, readFileSync, statSync } from 'node:fs';
import { join } from 'node:path';
import { migrate } from '../../server/database/migrate';
import { ensureDatabase, onDatabase, withClient } from '../../server/database/roles';
import { checkoutFolder } from '../../server/launch/checkout';
import { type clusterVariables } from './cluster';

/*
 * A database of its own for each test file, copied from a migrated template in a fraction of a
 * second:
 *
 *   const database = await createTestDatabase();
 *   ... database.appUrl ...
 *   await database.drop();
 *
 * Variables, set by tests/run.ts or by tests/support/cluster.setup.ts:
 *   TEST_ADMIN_URL  superuser of the throw-away cluster
 *   TEST_OWNER_URL  quartzhold_owner, owns the schema
 *   TEST_APP_URL    quartzhold_app, what the server connects as
 */
export interface TestDatabase {
  name: string;
  adminUrl: string;
  ownerUrl: string;
  appUrl: string;
  drop: () => Promise<void>;
}

export async function createTestDatabase(): Promise<TestDatabase> {
  return copyOfTemplate(await migratedTemplate());
}

/** A database of its own that begins as the template is. */
export async function copyOfTemplate(template: string): Promise<TestDatabase> {
  const name = `test_${process.pid}_${randomBytes(5).toString('hex')}`;
  await ensureDatabase(serverUrl('TEST_ADMIN_URL'), name, template);
  return testDatabase(name);
}

/** Without tables: for tests of the migrations themselves. */
export async function createEmptyDatabase(): Promise<TestDatabase> {
  const name = `test_${process.pid}_${randomBytes(5).toString('hex')}`;
  await ensureDatabase(serverUrl('TEST_ADMIN_URL'), name);
  return testDatabase(name);
}

function testDatabase(name: string): TestDatabase {
  return {
    name,
    adminUrl: onDatabase(serverUrl('TEST_ADMIN_URL'), name),
    ownerUrl: onDatabase(serverUrl('TEST_OWNER_URL'), name),
    appUrl: onDatabase(serverUrl('TEST_APP_URL'), name),
    drop: () =>
      withClient(serverUrl('TEST_ADMIN_URL'), async (client) => {
        await client.query(`DROP DATABASE IF EXISTS "${name}" WITH (FORCE)`);
      }),
  };
}

export function serverUrl(variable: (typeof clusterVariables)[number]): string {
  const url = process.env[variable];
  if (!url) {
    throw new Error(
      `${variable} is not set: run the suite by "npm test -- api" or "npx vitest run --project api <file>", which start a database server first.`,
    );
  }
  return url;
}

let template: Promise<string> | undefined;

/** Named by the migrations' contents, so that a changed migration makes a new one. */
export function migratedTemplate(): Promise<string> {
  template ??= buildTemplate();
  return template;
}

async function buildTemplate(): Promise<string> {
  const name = `template_${schemaMark()}`;
  await ensureTemplate(name, undefined, async (draft) => {
    await migrate(onDatabase(serverUrl('TEST_OWNER_URL'), draft));
  });
  return name;
}

/** Makes a template by copying `from` (or from nothing) and filling the copy; whoever else wants it at the same moment waits. */
export async function ensureTemplate(
  name: string,
  from: string | undefined,
  fill: (draft: string) => Promise<void>,
): Promise<void> {
  const adminUrl = serverUrl('TEST_ADMIN_URL');
  await withClient(adminUrl, async (client) => {
    await client.query('SELECT pg_advisory_lock(hashtext($1))', [`quartzhold test ${name}`]);
    const known = await client.query('SELECT 1 FROM pg_database WHERE datname = $1', [name]);
    if (known.rowCount) return;
    const draft = `${name}_draft`;
    await client.query(`DROP DATABASE IF EXISTS "${draft}" WITH (FORCE)`);
    await ensureDatabase(adminUrl, draft, from);
    await fill(draft);
    await client.query(
      'SELECT pg_terminate_backend(pid) FROM pg_stat_activity WHERE datname = $1',
      [draft],
    );
    await client.query(`ALTER DATABASE "${draft}" RENAME TO "${name}"`);
    // A template that somebody is connected to cannot be copied.
    await client.query(`ALTER DATABASE "${name}" ALLOW_CONNECTIONS false`);
  });
}

/** What the shape of a migrated database depends on. */
const schemaSources = ['server/migrations', 'server/database', 'server/jobs/queues.ts'];

function schemaMark(): string {
  return markOf(schemaSources);
}

/** Changes with the contents of these files and folders. */
export function markOf(places: readonly string[]): string {
  const hash = createHash('sha256');
  for (const file of places.flatMap(filesUnder)) hash.update(file).update(readFileSync(file));
  return hash.digest('hex').slice(0, 16);
}

function filesUnder(place: string): string[] {
  const path = join(checkoutFolder, place);
  if (statSync(path).isFile()) return [path];
  return readdirSync(path, { recursive: true, encoding: 'utf8' })
    .filter((name) => name.endsWith('.ts'))
    .sort()
    .map((name) => join(path, name));
}
