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
  const template = await migratedTemplate();
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

function serverUrl(variable: (typeof clusterVariables)[number]): string {
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
function migratedTemplate(): Promise<string> {
  template ??= buildTemplate();
  return template;
}

async function buildTemplate(): Promise<string> {
  const adminUrl = serverUrl('TEST_ADMIN_URL');
  const name = `template_${schemaMark()}`;
  await withClient(adminUrl, async (client) => {
    // Several test files want it at the same moment; one builds, the others wait.
    await client.query(`SELECT pg_advisory_lock(hashtext('quartzhold test template'))`);
    const known = await client.query('SELECT 1 FROM pg_database WHERE datname = $1', [name]);
    if (known.rowCount) return;
    const draft = `${name}_draft`;
    await client.query(`DROP DATABASE IF EXISTS "${draft}" WITH (FORCE)`);
    await ensureDatabase(adminUrl, draft);
    await migrate(onDatabase(serverUrl('TEST_OWNER_URL'), draft));
    await client.query(
      'SELECT pg_terminate_backend(pid) FROM pg_stat_activity WHERE datname = $1',
      [draft],
    );
    await client.query(`ALTER DATABASE "${draft}" RENAME TO "${name}"`);
    // A template that somebody is connected to cannot be copied.
    await client.query(`ALTER DATABASE "${name}" ALLOW_CONNECTIONS false`);
  });
  return name;
}

/** What the shape of a migrated database depends on. */
const schemaSources = ['server/migrations', 'server/database', 'server/jobs/queues.ts'];

function schemaMark(): string {
  const hash = createHash('sha256');
  for (const file of schemaSources.flatMap(filesUnder))
    hash.update(file).update(readFileSync(file));
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
