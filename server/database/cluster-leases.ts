import { mkdirSync, readdirSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { bornAt, readIfThere, withLock } from '../launch/lock';

/**
 * Several processes may use one cluster at once (two starts, several test runs). Each leaves a
 * lease, a file named by its process id; the one that takes away the last lease stops the cluster.
 */
export class ClusterLeases {
  private readonly folder: string;

  constructor(private readonly home: string) {
    this.folder = join(home, 'leases');
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
  alone<T>(act: () => Promise<T>): Promise<T> {
    return withLock(join(this.home, 'lock'), act);
  }
}
