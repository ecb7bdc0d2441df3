import { mkdirSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { setTimeout as wait } from 'node:timers/promises';
import { LaunchError } from '../launch/command';

/**
 * Several processes may use one cluster at once (two starts, several test runs). Each leaves a
 * lease, a file named by its process id; the one that takes away the last lease stops the cluster.
 */
export class ClusterLeases {
  private readonly folder: string;
  private readonly lockFile: string;

  constructor(home: string) {
    this.folder = join(home, 'leases');
    this.lockFile = join(home, 'lock');
    mkdirSync(this.folder, { recursive: true });
  }

  take(): void {
    writeFileSync(join(this.folder, String(process.pid)), bornAt(process.pid) ?? '');
  }

  giveBack(): void {
    rmSync(join(this.folder, String(process.pid)), { force: true });
  }

  /** Process ids, other than this one, that use the cluster; leases of the dead are swept. */
  others(): number[] {
    return readdirSync(this.folder)
      .map(Number)
      .filter((pid) => {
        if (pid === process.pid) return false;
        const lease = join(this.folder, String(pid));
        // The number alone could by now belong to somebody else.
        if (bornAt(pid) === readIfThere(lease)) return true;
        rmSync(lease, { force: true });
        return false;
      });
  }

  /** Starting and stopping happen one process at a time. */
  async alone<T>(act: () => Promise<T>): Promise<T> {
    await this.lock();
    try {
      return await act();
    } finally {
      rmSync(this.lockFile, { force: true });
    }
  }

  private async lock(): Promise<void> {
    for (let attempt = 0; attempt < 1200; attempt += 1) {
      try {
        writeFileSync(this.lockFile, String(process.pid), { flag: 'wx' });
        return;
      } catch (error) {
        if ((error as NodeJS.ErrnoException).code !== 'EEXIST') throw error;
      }
      if (this.heldByTheDead()) rmSync(this.lockFile, { force: true });
      else await wait(100);
    }
    throw new LaunchError(
      'cluster_locked',
      `Another process holds ${this.lockFile} for two minutes: end it, or remove the file if it is gone.`,
    );
  }

  private heldByTheDead(): boolean {
    const pid = Number(readIfThere(this.lockFile));
    return pid > 0 && bornAt(pid) === undefined;
  }
}

/** When the process was born, in the kernel's ticks; undefined when it is gone or only a zombie. */
export function bornAt(pid: number): string | undefined {
  const stat = readIfThere(`/proc/${pid}/stat`);
  // The second field is the program's name in brackets and may hold anything.
  const fields = stat?.slice(stat.lastIndexOf(')') + 2).split(' ');
  return fields && fields[0] !== 'Z' ? fields[19] : undefined;
}

function readIfThere(file: string): string | undefined {
  try {
    return readFileSync(file, 'utf8');
  } catch {
    return undefined;
  }
}
