import { spawn, type ChildProcess } from 'node:child_process';
import { createReadStream, readFileSync, statSync } from 'node:fs';
import { request, type IncomingMessage } from 'node:http';
import { join } from 'node:path';
import { pipeline } from 'node:stream/promises';
import { checkoutFolder } from '../../../server/launch/checkout';

export interface Product {
  port: number;
  upload(lotId: string, file: string): Promise<string>;
  /** Resolves when the upload is done and its lot analysed. */
  done(uploadId: string): Promise<void>;
  /** Greatest resident memory of each process so far, in MiB. */
  peaks(): { web: number; worker: number };
  stop(): Promise<void>;
}

/** The built server as it runs in production: a web process and a worker process. */
export async function startProduct(
  env: NodeJS.ProcessEnv,
  account: { email: string; password: string },
): Promise<Product> {
  const port = 20_000 + Math.floor(Math.random() * 20_000);
  const start = (role: string) =>
    spawn(process.execPath, [join(checkoutFolder, '.local/bench-server/index.js')], {
      cwd: checkoutFolder,
      env: { ...process.env, ...env, PORT: String(port), QUARTZHOLD_ROLE: role, NODE_ENV: 'test' },
      stdio: ['ignore', 'ignore', 'inherit'],
    });
  const web = start('web');
  const worker = start('worker');
  await untilReady(port);
  const cookie = await signIn(port, account);
  const headers = { 'X-Quartzhold': '1', Cookie: cookie };
  return {
    port,
    async upload(lotId, file) {
      const boundary = 'quartzhold-bench-boundary';
      const head = `--${boundary}\r\nContent-Disposition: form-data; name="file"; filename="readings.csv"\r\nContent-Type: text/csv\r\n\r\n`;
      const tail = `\r\n--${boundary}--\r\n`;
      const outgoing = request({
        port,
        host: '127.0.0.1',
        method: 'POST',
        path: `/api/lots/${lotId}/uploads`,
        headers: {
          ...headers,
          'Content-Type': `multipart/form-data; boundary=${boundary}`,
          'Content-Length': head.length + statSync(file).size + tail.length,
        },
      });
      const answered = answerOf(outgoing);
      await pipeline(async function* () {
        yield head;
        yield* createReadStream(file, { highWaterMark: 256 * 1024 });
        yield tail;
      }, outgoing);
      const { status, text } = await answered;
      if (status !== 202) throw new Error(`Upload answered ${status}: ${text}`);
      return (JSON.parse(text) as { id: string }).id;
    },
    async done(uploadId) {
      for (;;) {
        const asked = request({
          port,
          host: '127.0.0.1',
          path: `/api/uploads/${uploadId}`,
          headers,
        });
        const answered = answerOf(asked);
        asked.end();
        const { text } = await answered;
        const upload = JSON.parse(text) as { state: string; failure: unknown };
        if (upload.state === 'done') return;
        if (upload.state === 'failed') throw new Error(JSON.stringify(upload.failure));
        await new Promise((resolve) => setTimeout(resolve, 20));
      }
    },
    peaks: () => ({ web: peakMiB(web), worker: peakMiB(worker) }),
    async stop() {
      await Promise.all([ended(web), ended(worker)]);
    },
  };
}

function answerOf(
  outgoing: ReturnType<typeof request>,
): Promise<{ status: number; text: string; message: IncomingMessage }> {
  return new Promise((resolve, reject) => {
    outgoing.on('error', reject);
    outgoing.on('response', (message) => {
      let text = '';
      message.setEncoding('utf8');
      message.on('data', (piece: string) => (text += piece));
      message.on('end', () => resolve({ status: message.statusCode ?? 0, text, message }));
    });
  });
}

async function untilReady(port: number): Promise<void> {
  for (let tries = 0; tries < 200; tries += 1) {
    const ready = await fetch(`http://127.0.0.1:${port}/api/health`).then(
      (answer) => answer.ok,
      () => false,
    );
    if (ready) return;
    await new Promise((resolve) => setTimeout(resolve, 100));
  }
  throw new Error('The server did not come up.');
}

async function signIn(port: number, account: { email: string; password: string }): Promise<string> {
  const answer = await fetch(`http://127.0.0.1:${port}/api/session`, {
    method: 'POST',
    headers: { 'Content-Type': 'application/json', 'X-Quartzhold': '1' },
    body: JSON.stringify(account),
  });
  if (!answer.ok) throw new Error(`Signing in answered ${answer.status}.`);
  return answer.headers
    .getSetCookie()
    .map((cookie) => cookie.split(';')[0])
    .join('; ');
}

function peakMiB(process: ChildProcess): number {
  const status = readFileSync(`/proc/${process.pid}/status`, 'utf8');
  return Math.round(Number(/VmHWM:\s+(\d+)/.exec(status)?.[1] ?? NaN) / 1024);
}

function ended(process: ChildProcess): Promise<void> {
  return new Promise((resolve) => {
    process.once('exit', () => resolve());
    process.kill('SIGTERM');
  });
}
