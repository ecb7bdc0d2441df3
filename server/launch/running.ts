import { spawn, type ChildProcess } from 'node:child_process';
import { createWriteStream, existsSync, mkdirSync, renameSync } from 'node:fs';
import { join } from 'node:path';
import { setTimeout as wait } from 'node:timers/promises';
import { checkoutFolder, localFolder } from './checkout';
import { say } from './say';

export interface ProgramToStart {
  title: string;
  /** Arguments of node. */
  arguments: readonly string[];
  env: NodeJS.ProcessEnv;
  /** Where its words go: the console, or .local/logs/<title>.log. */
  log: 'console' | 'file';
}

// The server gives itself 25 seconds to end what it has begun.
const graceMs = 30_000;
const echoMs = 1500;
const linesKept = 25;
const logFolder = join(localFolder, 'logs');

/** Everything a launcher started; stopped in the opposite order, whatever the cause. */
export class Running {
  private readonly stops: (() => Promise<void>)[] = [];
  private stopping: Promise<void> | undefined;
  private stoppingSince = 0;
  private acquiring: Promise<unknown> = Promise.resolve();

  constructor() {
    const parent = process.ppid;
    for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP'] as const) {
      process.on(signal, () => {
        // npm passes on the Ctrl-C that the terminal has already sent; a later one is from somebody who will not wait.
        if (this.stopping && Date.now() - this.stoppingSince > echoMs) process.exit(130);
        void this.end(0, 'Stopping ...');
      });
    }
    // npm or the shell in between can be ended without passing the signal on.
    setInterval(() => {
      if (process.ppid !== parent) void this.end(0, 'Stopping ...');
    }, 1000).unref();
  }

  /** Gets something that must be given back; an end in the middle waits for it and gives it back. */
  async acquire<T extends { stop: () => Promise<void> }>(get: () => Promise<T>): Promise<T> {
    if (this.stopping) return new Promise(() => undefined);
    const getting = get().then((got) => {
      this.stops.push(() => got.stop());
      return got;
    });
    this.acquiring = getting.catch(() => undefined);
    return getting;
  }

  /** Starts a node program that belongs to this launcher; its end before ours ends everything. */
  start(program: ProgramToStart): void {
    if (this.stopping) return;
    const child = spawn(
      process.execPath,
      ['--import', join(checkoutFolder, 'server/launch/follow-parent.mjs'), ...program.arguments],
      {
        cwd: checkoutFolder,
        env: program.env,
        stdio: ['ignore', 'pipe', 'pipe', 'ipc'],
        // A group of its own: Ctrl-C in the terminal reaches the launcher alone, which stops all in order.
        detached: true,
      },
    );
    const lastLines = listen(child, program);
    this.stops.push(() => stopChild(child));
    child.on('close', (code, signal) => {
      if (this.stopping) return;
      say(`The ${program.title} ended unexpectedly (${signal ?? `code ${code}`}). Its last words:`);
      for (const line of lastLines()) say(`  ${line}`);
      void this.end(1);
    });
  }

  async end(code: number, words?: string): Promise<never> {
    if (!this.stopping) {
      if (words) say(words);
      this.stoppingSince = Date.now();
      this.stopping = this.stopAll();
    }
    await this.stopping;
    process.exit(code);
  }

  /** False once the end has begun: whoever waits for something should give up quietly. */
  get ending(): boolean {
    return this.stopping !== undefined;
  }

  private async stopAll(): Promise<void> {
    await Promise.race([this.acquiring, wait(graceMs)]);
    for (const stop of this.stops.reverse()) {
      await stop().catch((error: unknown) => say(`While stopping: ${String(error)}`));
    }
  }
}

function listen(child: ChildProcess, program: ProgramToStart): () => string[] {
  const last: string[] = [];
  let sink: NodeJS.WritableStream = process.stdout;
  if (program.log === 'file') {
    mkdirSync(logFolder, { recursive: true, mode: 0o700 });
    const file = join(logFolder, `${program.title}.log`);
    if (existsSync(file)) renameSync(file, `${file}.before`);
    sink = createWriteStream(file);
  }
  for (const stream of [child.stdout!, child.stderr!]) {
    stream.on('data', (chunk: Buffer) => {
      sink.write(chunk);
      last.push(...chunk.toString().split('\n').filter(Boolean));
      last.splice(0, last.length - linesKept);
    });
  }
  return () => last;
}

function stopChild(child: ChildProcess): Promise<void> {
  if (child.exitCode !== null || child.signalCode !== null) return Promise.resolve();
  return new Promise((resolve) => {
    const hard = setTimeout(() => child.kill('SIGKILL'), graceMs);
    child.once('exit', () => {
      clearTimeout(hard);
      resolve();
    });
    child.kill('SIGTERM');
  });
}
