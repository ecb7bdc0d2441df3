import { spawn, type ChildProcess } from 'node:child_process';
import { once } from 'node:events';
import { cpSync, mkdtempSync, rmSync, symlinkSync } from 'node:fs';
import { createServer, type AddressInfo } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { type Page } from 'playwright-core';
import { ensureBuilt } from '../../server/launch/build';
import { checkoutFolder } from '../../server/launch/checkout';
import { waitForHealth } from '../../server/launch/health';
import { startMailFake, type MailFake } from '../../server/mail/fake';
import { createDemoDatabase, demoPassphrase, type DemoDatabase } from './demo-database';

/*
 * The product as people have it: the built server, its worker and the mail fake on a database of its own with the demo
 * in it. One for each test file:
 *
 *   const server = await startServer();
 *   await server.signIn(page, 'quality');        // the first page is open
 *   await page.goto(`${server.url}/lots`);
 *   await server.stop();
 */
export type DemoPerson =
  'technician' | 'quality' | 'quality2' | 'supplier' | 'supplier2' | 'auditor' | 'admin';

export interface TestServer {
  /** Without a slash at the end. */
  url: string;
  /** Page of the mail fake. */
  mailUrl: string;
  mail: MailFake;
  database: DemoDatabase;
  passphrase: string;
  emailOf(who: DemoPerson): string;
  /** Gives the page's context a session, then opens `path` and waits for its heading. The form itself is for tests of the form. */
  signIn(page: Page, who: DemoPerson, path?: string): Promise<void>;
  /** Signed in without a page: asks the API as this person. Throws with the answer when it is refused. */
  apiOf(who: DemoPerson): Promise<ApiCall>;
  stop(): Promise<void>;
}

export type ApiCall = <Answer = unknown>(
  method: 'GET' | 'POST' | 'PUT' | 'PATCH' | 'DELETE',
  path: string,
  body?: unknown,
) => Promise<Answer>;

export async function startServer(changes: NodeJS.ProcessEnv = {}): Promise<TestServer> {
  await ensureBuilt('client', 'server');
  const [database, mail, port] = await Promise.all([
    createDemoDatabase(),
    startMailFake(),
    freePort(),
  ]);
  const folder = layOut(database);
  const url = `http://127.0.0.1:${port}`;
  const env: NodeJS.ProcessEnv = {
    PATH: process.env.PATH,
    HOME: process.env.HOME,
    NODE_ENV: 'development',
    DATABASE_URL: database.appUrl,
    SMTP_URL: mail.smtpUrl,
    PUBLIC_URL: url,
    PORT: String(port),
    SESSION_SECRET: 'only for this test, 32 characters or more',
    LOG_LEVEL: 'warn',
    CHECKPOINT_KEY_FILE: join(folder, 'outside/checkpoint.pem'),
    CHECKPOINT_FOLDER: join(folder, 'outside/checkpoints'),
    DEMO: 'true',
    ...changes,
  };
  const children = (['web', 'worker'] as const).map((role) =>
    spawn(process.execPath, ['--enable-source-maps', 'dist/server/index.js'], {
      cwd: folder,
      env: { ...env, QUARTZHOLD_ROLE: role },
      stdio: ['ignore', 'inherit', 'inherit'],
    }),
  );
  const stop = async () => {
    await Promise.all(children.map(ended));
    await mail.stop();
    await database.drop();
    rmSync(folder, { recursive: true, force: true });
  };
  const emailOf = (who: DemoPerson) => `${who}@quartzhold.test`;
  try {
    await waitForHealth(url);
  } catch (error) {
    await stop();
    throw error;
  }
  return {
    url,
    mailUrl: mail.pageUrl,
    mail,
    database,
    passphrase: demoPassphrase,
    emailOf,
    async signIn(page, who, path = '/') {
      const answer = await page.request.post(`${url}/api/session`, {
        data: { email: emailOf(who), password: demoPassphrase },
        headers: { 'X-Quartzhold': '1', Origin: url },
      });
      if (!answer.ok()) throw new Error(`Signing in answered ${answer.status()}.`);
      await page.goto(url + path);
      await page.getByRole('heading', { level: 1 }).waitFor();
    },
    apiOf: (who) => signedInCall(url, emailOf(who)),
    stop,
  };
}

/** A copy of the build, so that another build in the meantime does not pull the pages from under the test. */
function layOut(database: DemoDatabase): string {
  const folder = mkdtempSync(join(tmpdir(), 'quartzhold-test-server-'));
  cpSync(join(checkoutFolder, 'dist'), join(folder, 'dist'), {
    recursive: true,
    // The mark of a build that runs meanwhile comes and goes.
    filter: (source) => !source.endsWith('.lock'),
  });
  for (const name of ['node_modules', 'server', 'package.json'])
    symlinkSync(join(checkoutFolder, name), join(folder, name));
  database.layOutside(join(folder, 'outside'));
  return folder;
}

async function freePort(): Promise<number> {
  const probe = createServer().listen(0, '127.0.0.1');
  await once(probe, 'listening');
  const { port } = probe.address() as AddressInfo;
  probe.close();
  await once(probe, 'close');
  return port;
}

async function signedInCall(url: string, email: string): Promise<ApiCall> {
  let cookie = '';
  const call: ApiCall = async <Answer>(method: string, path: string, body?: unknown) => {
    const isForm = body instanceof FormData;
    const answer = await fetch(url + path, {
      method,
      headers: {
        'X-Quartzhold': '1',
        ...(cookie ? { Cookie: cookie } : {}),
        ...(body === undefined || isForm ? {} : { 'Content-Type': 'application/json' }),
      },
      body: isForm ? body : body === undefined ? undefined : JSON.stringify(body),
    });
    const text = await answer.text();
    if (!answer.ok) throw new Error(`${method} ${path} answered ${answer.status}: ${text}`);
    const set = answer.headers.getSetCookie();
    if (set.length > 0) cookie = set.map((one) => one.split(';')[0]).join('; ');
    return (text === '' ? undefined : JSON.parse(text)) as Answer;
  };
  await call('POST', '/api/session', { email, password: demoPassphrase });
  return call;
}

async function ended(child: ChildProcess): Promise<void> {
  if (child.exitCode !== null || child.signalCode !== null) return;
  const gone = once(child, 'exit');
  child.kill('SIGTERM');
  await gone;
}
