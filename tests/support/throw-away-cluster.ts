import { chownSync, mkdtempSync, readdirSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { startCluster, type Cluster } from '../../server/database/cluster';
import { serverAccount } from '../../server/database/cluster-home';
import { postgresPrograms } from '../../server/database/postgres-programs';
import { killPostmaster } from '../../server/database/postmaster';
import { bornAt } from '../../server/launch/lock';

export interface ThrowAwayCluster extends Cluster {
  /** Stops the cluster and removes its folder. */
  remove: () => Promise<void>;
}

/** Of temporary folders, followed by the process id of their maker, so that a later run can sweep them. */
export const throwAwayPrefix = 'quartzhold-test-';

/** A cluster in a temporary folder, for one run of the suites. */
export async function startThrowAwayCluster(): Promise<ThrowAwayCluster> {
  sweepAfterTheKilled();
  // Its package brings the account, so it comes first.
  await postgresPrograms();
  const account = await serverAccount();
  const home = mkdtempSync(join(tmpdir(), `${throwAwayPrefix}${process.pid}-`));
  if (account.uid !== undefined) chownSync(home, account.uid, account.gid!);
  const removeHome = () => rmSync(home, { recursive: true, force: true, maxRetries: 5 });
  try {
    const cluster = await startCluster({ name: 'throw-away', home, durable: false });
    const remove = async () => {
      await cluster.stop();
      removeHome();
    };
    return { ...cluster, remove };
  } catch (error) {
    killPostmaster(join(home, 'data'));
    removeHome();
    throw error;
  }
}

/** A run ended by SIGKILL could not clean up; the next one does. */
function sweepAfterTheKilled(): void {
  for (const name of readdirSync(tmpdir())) {
    if (!name.startsWith(throwAwayPrefix)) continue;
    const pid = Number(name.slice(throwAwayPrefix.length).split('-')[0]);
    if (!pid || bornAt(pid) !== undefined) continue;
    const home = join(tmpdir(), name);
    try {
      killPostmaster(join(home, 'data'));
      rmSync(home, { recursive: true, force: true, maxRetries: 5 });
    } catch {
      // Another user's; not ours to remove.
    }
  }
}
