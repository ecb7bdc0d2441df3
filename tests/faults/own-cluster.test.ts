import { spawn } from 'node:child_process';
import { chownSync, mkdtempSync, readFileSync, rmSync, statSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { setTimeout as wait } from 'node:timers/promises';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { startCluster, type Cluster } from '../../server/database/cluster';
import { serverAccount } from '../../server/database/cluster-home';
import { withClient } from '../../server/database/roles';
import { bornAt } from '../../server/launch/lock';

describe('the database cluster of its own', () => {
  const home = mkdtempSync(join(tmpdir(), `quartzhold-test-${process.pid}-`));
  const pidFile = join(home, 'data', 'postmaster.pid');
  let cluster: Cluster | undefined;

  const start = async () =>
    (cluster = await startCluster({ name: 'faults', home, durable: false }));
  const postmasterPid = () => Number(readFileSync(pidFile, 'utf8').split('\n')[0]);
  const count = (url: string) =>
    withClient(url, async (client) => (await client.query('SELECT id FROM kept')).rowCount);

  beforeAll(async () => {
    const { uid, gid } = await serverAccount();
    if (uid !== undefined) chownSync(home, uid, gid!);
    await start();
    await withClient(cluster!.adminUrl, (client) =>
      client.query('CREATE TABLE kept (id int); INSERT INTO kept VALUES (1)'),
    );
    // What was acknowledged is on disk even though a test cluster does not wait for it.
    await withClient(cluster!.adminUrl, (client) => client.query('CHECKPOINT'));
  });
  afterAll(async () => {
    await cluster?.stop();
    rmSync(home, { recursive: true, force: true });
  });

  it('keeps its passwords from other users', () => {
    expect(statSync(join(home, 'credentials.json')).mode & 0o777).toBe(0o600);
    expect(statSync(join(home, 'data')).mode & 0o077).toBe(0);
  });

  it('is reused while it runs, and on the same port after a stop', async () => {
    const first = cluster!;
    const pid = postmasterPid();
    const again = await start();
    expect(again.port).toBe(first.port);
    expect(postmasterPid()).toBe(pid);

    await again.stop();
    expect(bornAt(pid)).toBeUndefined();
    expect((await start()).port).toBe(first.port);
    expect(await count(cluster!.adminUrl)).toBe(1);
  });

  it('comes back after its server was killed', async () => {
    const pid = postmasterPid();
    process.kill(pid, 'SIGKILL');
    while (bornAt(pid) !== undefined) await wait(20);
    expect(readFileSync(pidFile, 'utf8')).toContain(String(pid));

    await start();
    expect(postmasterPid()).not.toBe(pid);
    expect(await count(cluster!.adminUrl)).toBe(1);
  });

  it('is not held up by a pid file that names a stranger', async () => {
    await cluster!.stop();
    const account = await serverAccount();
    // PostgreSQL itself refuses to start when the number belongs to a process of its own user.
    const stranger = spawn('sleep', ['60'], { ...account, cwd: '/' });
    try {
      writeFileSync(
        pidFile,
        `${stranger.pid}\n${join(home, 'data')}\n1\n5432\n\n127.0.0.1\n\nready\n`,
      );
      await start();
      expect(postmasterPid()).not.toBe(stranger.pid);
      expect(await count(cluster!.adminUrl)).toBe(1);
      expect(bornAt(stranger.pid!)).toBeDefined();
    } finally {
      stranger.kill();
    }
  });
});
