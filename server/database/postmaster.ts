import { existsSync, readFileSync, readdirSync, readlinkSync, realpathSync, rmSync } from 'node:fs';
import { createServer } from 'node:net';
import { join } from 'node:path';
import { setTimeout as wait } from 'node:timers/promises';
import { run, runOrStop, type CommandOptions } from '../launch/command';
import type { ServerAccount } from './cluster-home';
import type { PostgresPrograms } from './postgres-programs';

export interface Postmaster {
  programs: PostgresPrograms;
  account: ServerAccount;
  dataFolder: string;
  logFile: string;
}

/** Port of the server that runs on this data folder now, if one does. */
export function runningPort({ dataFolder }: Postmaster): number | undefined {
  const pidFile = readPidFile(dataFolder);
  if (!pidFile || !worksIn(pidFile.pid, dataFolder)) return undefined;
  return pidFile.port;
}

/**
 * After a crash or a restart of the machine the pid file may name a process that is now something
 * else, and PostgreSQL would refuse to start. It is removed once nothing works in the data folder.
 */
export async function sweepStalePidFile({ dataFolder }: Postmaster): Promise<void> {
  const file = join(dataFolder, 'postmaster.pid');
  if (!existsSync(file)) return;
  for (let tenths = 0; tenths < 100; tenths += 1) {
    if (!processesIn(dataFolder).length) return rmSync(file, { force: true });
    await wait(100);
  }
}

export async function startPostmaster(
  postmaster: Postmaster,
  port: number,
  settings: Readonly<Record<string, string>>,
): Promise<void> {
  const all = {
    listen_addresses: '127.0.0.1',
    port: String(port),
    unix_socket_directories: '',
    password_encryption: 'scram-sha-256',
    // GMT is the one zone that needs no zone files, which a bare machine may lack.
    timezone: 'GMT',
    log_timezone: 'GMT',
    logging_collector: 'off',
    ...settings,
  };
  const options = Object.entries(all).map(([name, value]) => `-c ${name}=${value}`);
  await runOrStop(
    'postgres_start',
    `PostgreSQL did not start on port ${port}; its log is ${postmaster.logFile}.`,
    postmaster.programs.pgCtl,
    ['start', '-s', '-w', '-t', '90', '-D', postmaster.dataFolder, '-l', postmaster.logFile].concat(
      '-o',
      options.join(' '),
    ),
    commandOptions(postmaster),
  );
}

export async function stopPostmaster(postmaster: Postmaster): Promise<void> {
  const stop = (mode: string) =>
    run(
      postmaster.programs.pgCtl,
      ['stop', '-s', '-w', '-t', '30', '-m', mode, '-D', postmaster.dataFolder],
      commandOptions(postmaster),
    );
  if (runningPort(postmaster) === undefined) return;
  if ((await stop('fast')).code !== 0) await stop('immediate');
}

/** For folders that are thrown away: ends the server at once. */
export function killPostmaster(dataFolder: string): void {
  const pidFile = readPidFile(dataFolder);
  if (pidFile && worksIn(pidFile.pid, dataFolder)) process.kill(pidFile.pid, 'SIGQUIT');
}

export function commandOptions({ programs, account }: Postmaster): CommandOptions {
  return {
    ...account,
    shielded: true,
    cwd: '/',
    env: { ...process.env, ...programs.env, LC_ALL: 'C.UTF-8' },
  };
}

/** A free port on loopback; the one wished for, if it is still free. */
export async function freePort(wished = 0): Promise<number> {
  const tried = await tryPort(wished);
  return tried ?? (await tryPort(0))!;
}

function tryPort(port: number): Promise<number | undefined> {
  return new Promise((resolve) => {
    const probe = createServer();
    probe.once('error', () => resolve(undefined));
    probe.listen({ port, host: '127.0.0.1', exclusive: true }, () => {
      const address = probe.address();
      const found = typeof address === 'object' && address ? address.port : undefined;
      probe.close(() => resolve(found));
    });
  });
}

function readPidFile(dataFolder: string): { pid: number; port: number } | undefined {
  const file = join(dataFolder, 'postmaster.pid');
  if (!existsSync(file)) return undefined;
  const lines = readFileSync(file, 'utf8').split('\n');
  return { pid: Number(lines[0]), port: Number(lines[3]) };
}

/** Every PostgreSQL process works in its data folder, which tells it from a stranger with the same number. */
function worksIn(pid: number, dataFolder: string): boolean {
  try {
    return readlinkSync(`/proc/${pid}/cwd`) === realpathSync(dataFolder);
  } catch {
    return false;
  }
}

function processesIn(dataFolder: string): number[] {
  return readdirSync('/proc')
    .map(Number)
    .filter((pid) => pid > 0 && worksIn(pid, dataFolder));
}
