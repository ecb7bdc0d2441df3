import { readFileSync, rmSync, writeFileSync } from 'node:fs';
import { setTimeout as wait } from 'node:timers/promises';
import { LaunchError } from './command';

/** Runs `act` while no other process of this machine runs one under the same file. */
export async function withLock<T>(file: string, act: () => Promise<T>): Promise<T> {
  await take(file);
  try {
    return await act();
  } finally {
    rmSync(file, { force: true });
  }
}

async function take(file: string): Promise<void> {
  for (let attempt = 0; attempt < 3000; attempt += 1) {
    try {
      writeFileSync(file, String(process.pid), { flag: 'wx' });
      return;
    } catch (error) {
      if ((error as NodeJS.ErrnoException).code !== 'EEXIST') throw error;
    }
    const holder = Number(readIfThere(file));
    if (holder > 0 && bornAt(holder) === undefined) rmSync(file, { force: true });
    else await wait(100);
  }
  throw new LaunchError(
    'locked',
    `Another process has held ${file} for five minutes: end it, or remove the file if it is gone.`,
  );
}

/** When the process was born, in the kernel's ticks; undefined when it is gone or only a zombie. */
export function bornAt(pid: number): string | undefined {
  const stat = readIfThere(`/proc/${pid}/stat`);
  // The second field is the program's name in brackets and may hold anything.
  const fields = stat?.slice(stat.lastIndexOf(')') + 2).split(' ');
  return fields && fields[0] !== 'Z' ? fields[19] : undefined;
}

export function readIfThere(file: string): string | undefined {
  try {
    return readFileSync(file, 'utf8');
  } catch {
    return undefined;
  }
}
