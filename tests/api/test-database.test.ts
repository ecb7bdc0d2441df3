import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { withClient } from '../../server/database/roles';
import { createTestDatabase, type TestDatabase } from '../support/database';

describe('the database a test gets', () => {
  let database: TestDatabase;
  beforeAll(async () => {
    database = await createTestDatabase();
  });
  afterAll(() => database.drop());

  const one = (url: string, sql: string) =>
    withClient(url, async (client) => Object.values((await client.query(sql)).rows[0]!)[0]);

  it('keeps checksums, UTF-8 and the C.UTF-8 locale', async () => {
    expect(await one(database.appUrl, 'SHOW data_checksums')).toBe('on');
    expect(await one(database.appUrl, 'SHOW server_encoding')).toBe('UTF8');
    expect(
      await one(
        database.appUrl,
        'SELECT datcollate FROM pg_database WHERE datname = current_database()',
      ),
    ).toBe('C.UTF-8');
  });

  it('listens on loopback only and asks for a password', async () => {
    expect(await one(database.adminUrl, 'SHOW listen_addresses')).toBe('127.0.0.1');
    const wrong = new URL(database.appUrl);
    wrong.password = 'not-the-password';
    await expect(one(wrong.href, 'SELECT 1')).rejects.toThrow(/password authentication failed/);
  });

  it('gives the app role no way to make or own tables', async () => {
    await expect(
      withClient(database.appUrl, (client) => client.query('CREATE TABLE intruder (id int)')),
    ).rejects.toThrow(/permission denied/);
    expect(
      await one(
        database.adminUrl,
        `SELECT rolsuper OR rolcreatedb OR rolcreaterole FROM pg_roles WHERE rolname = 'quartzhold_app'`,
      ),
    ).toBe(false);
  });

  it('lets the owner role make the schema', async () => {
    await withClient(database.ownerUrl, (client) =>
      client.query('CREATE TABLE owned_probe (id int); DROP TABLE owned_probe'),
    );
    expect(await one(database.ownerUrl, 'SELECT current_user')).toBe('quartzhold_owner');
  });
});
