import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { startApi, type Api } from '../support/api';

let api: Api;
beforeAll(async () => {
  api = await startApi();
});
afterAll(() => api.close());

describe('the state of the server', () => {
  it('is one word for strangers and everybody but administrators', async () => {
    for (const agent of [
      api.stranger(),
      await api.agentFor('technician'),
      await api.agentFor('supplier_contact'),
    ]) {
      const { body } = await agent.get('/api/health').expect(200);
      expect(body).toMatchObject({ status: 'ok', version: '', checks: [] });
    }
  });

  it('tells administrators what keeps data alive, as the database itself says', async () => {
    const admin = await api.agentFor('administrator');
    const { body } = await admin.get('/api/health').expect(200);
    const names = body.checks.map(({ name }: { name: string }) => name);
    expect(names).toEqual(
      expect.arrayContaining([
        'database',
        'fsync',
        'full_page_writes',
        'synchronous_commit',
        'data_checksums',
        'worker',
        'mail queue',
      ]),
    );
    const said = Object.fromEntries(
      body.checks.map(({ name, ok }: { name: string; ok: boolean }) => [name, ok]),
    );
    const { rows } = await api.database.pool.query<{ fsync: string; data_checksums: string }>(
      `SELECT current_setting('fsync') AS fsync, current_setting('data_checksums') AS data_checksums`,
    );
    expect(said.fsync).toBe(rows[0]!.fsync === 'on');
    expect(said.data_checksums).toBe(rows[0]!.data_checksums === 'on');
    // Nobody started a worker here, and the page must not pretend otherwise.
    expect(said.worker).toBe(false);
    expect(body.status).toBe('degraded');
  });
});
