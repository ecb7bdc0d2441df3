import { Umzug, type UmzugStorage } from 'umzug';
import { Client } from 'pg';
import { migrations } from '../migrations';
import { grantSql } from './grants';
import { createQueues } from '../jobs/queues';

/** Any number; every server that starts at the same time asks for the same lock and waits its turn. */
const migrationLock = 7172616;

function storage(client: Client): UmzugStorage {
  return {
    async executed() {
      const { rows } = await client.query<{ name: string }>(
        'SELECT name FROM schema_migrations ORDER BY name',
      );
      return rows.map((row) => row.name);
    },
    // The name is written by the step's own transaction (below), so that a step cannot be done and forgotten.
    async logMigration() {},
    async unlogMigration() {},
  };
}

async function inTransaction(client: Client, ...statements: [sql: string, values?: unknown[]][]) {
  await client.query('BEGIN');
  try {
    for (const [sql, values] of statements) await client.query(sql, values);
    await client.query('COMMIT');
  } catch (error) {
    await client.query('ROLLBACK');
    throw error;
  }
}

export function migrator(client: Client) {
  return new Umzug({
    logger: undefined,
    storage: storage(client),
    migrations: migrations.map((step) => ({
      name: step.name,
      up: () =>
        inTransaction(
          client,
          [step.up],
          ['INSERT INTO schema_migrations (name) VALUES ($1)', [step.name]],
        ),
      down: () =>
        inTransaction(
          client,
          [step.down],
          ['DELETE FROM schema_migrations WHERE name = $1', [step.name]],
        ),
    })),
  });
}

/**
 * Brings the schema up to date as its owner and grants the application's role what it needs and no more.
 * Safe to run from several processes at once.
 */
export async function migrate(ownerUrl: string, appRole = 'quartzhold_app'): Promise<string[]> {
  const client = new Client({ connectionString: ownerUrl });
  await client.connect();
  try {
    await client.query('SELECT pg_advisory_lock($1)', [migrationLock]);
    await client.query(
      'CREATE TABLE IF NOT EXISTS schema_migrations (name text PRIMARY KEY, done_at timestamptz NOT NULL DEFAULT now())',
    );
    const done = await migrator(client).up();
    await createQueues(ownerUrl);
    await client.query(grantSql(appRole));
    return done.map((step) => step.name);
  } finally {
    await client.end();
  }
}
