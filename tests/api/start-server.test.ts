import { spawn } from 'node:child_process';
import { once } from 'node:events';
import { createServer, type AddressInfo } from 'node:net';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { createTestDatabase, type TestDatabase } from '../support/database';

let database: TestDatabase;
beforeAll(async () => {
  database = await createTestDatabase();
});
afterAll(() => database.drop());

/** Runs the server as a process of its own until it ends or says what is waited for. */
function start(changes: Record<string, string>) {
  const child = spawn(process.execPath, ['--import', 'tsx', 'server/index.ts'], {
    env: {
      PATH: process.env.PATH,
      HOME: process.env.HOME,
      NODE_ENV: 'development',
      QUARTZHOLD_ROLE: 'web',
      DATABASE_URL: database.appUrl,
      SMTP_URL: 'smtp://127.0.0.1:1',
      SESSION_SECRET: 'only for this test, 32 characters or more',
      PORT: '0',
      ...changes,
    },
    stdio: ['ignore', 'pipe', 'pipe'],
  });
  let said = '';
  const ended = new Promise<number | null>((resolve) => child.on('close', resolve));
  const saying = (wanted: RegExp) =>
    new Promise<string>((resolve, reject) => {
      const look = (chunk: Buffer) => {
        said += chunk.toString();
        if (wanted.test(said)) resolve(said);
      };
      child.stdout.on('data', look);
      child.stderr.on('data', look);
      void ended.then((code) => reject(new Error(`It ended with ${code} and said: ${said}`)));
    });
  return { child, ended, saying };
}

async function outcome(changes: Record<string, string>) {
  const { ended, saying } = start(changes);
  const said = await saying(/$never/).catch((error: Error) => error.message);
  return { code: await ended, said };
}

describe('the server as a process', () => {
  it('listens, answers, and ends in order when told to', async () => {
    const { child, ended, saying } = start({});
    const address = /http:\/\/127\.0\.0\.1:\d+/.exec(await saying(/Listening on/))![0];
    const health = await fetch(`${address}/api/health`);
    expect(health.status).toBe(200);
    child.kill('SIGTERM');
    expect(await ended).toBe(0);
  });

  it('ends with an error when its port is taken', async () => {
    const other = createServer().listen(0, '127.0.0.1');
    await once(other, 'listening');
    const { port } = other.address() as AddressInfo;
    const { code, said } = await outcome({ PORT: String(port) });
    other.close();
    expect(code).toBe(1);
    expect(said).toMatch(/EADDRINUSE/);
  });

  it('ends with one line that names a setting that is missing', async () => {
    const { code, said } = await outcome({ NODE_ENV: 'production', PUBLIC_URL: '' });
    expect(code).toBe(1);
    expect(said).toMatch(/Setting PUBLIC_URL is missing/);
    expect(said.trim().split('\n')).toHaveLength(1);
  });

  it('prints the link for the first administrator in production, and nowhere else', async () => {
    const { child, ended, saying } = start({
      NODE_ENV: 'production',
      PUBLIC_URL: 'https://quartzhold.example',
    });
    const said = await saying(/Listening on/);
    child.kill('SIGTERM');
    expect(await ended).toBe(0);
    expect(said).toMatch(/https:\/\/quartzhold\.example\/links\/[\w-]{43}\n/);
    const development = start({});
    const quiet = await development.saying(/Listening on/);
    development.child.kill('SIGTERM');
    await development.ended;
    expect(quiet).not.toMatch(/\/links\//);
  });
});
