import { startCluster, type Cluster } from '../../server/database/cluster';
import { onDatabase, withClient } from '../../server/database/roles';

/**
 * The suites find their database server in these variables. `npm test` sets them for a cluster it
 * throws away; without them (vitest run directly) a cluster under .local/test-cluster is used, kept
 * between runs and shared by runs at the same time.
 */
export const clusterVariables = ['TEST_ADMIN_URL', 'TEST_OWNER_URL', 'TEST_APP_URL'] as const;

export function publishCluster(cluster: Pick<Cluster, 'adminUrl' | 'ownerUrl' | 'appUrl'>): void {
  process.env.TEST_ADMIN_URL = cluster.adminUrl;
  process.env.TEST_OWNER_URL = cluster.ownerUrl;
  process.env.TEST_APP_URL = cluster.appUrl;
}

export function clusterPublished(): boolean {
  return clusterVariables.every((name) => process.env[name]);
}

export async function startReusableTestCluster(): Promise<Cluster> {
  const cluster = await startCluster({ name: 'test-cluster', durable: false });
  if (cluster.alone) await dropLeftovers(cluster.adminUrl);
  return cluster;
}

/** Databases of runs that were killed before they could drop them. */
async function dropLeftovers(adminUrl: string): Promise<void> {
  const names = await withClient(adminUrl, async (client) => {
    const found = await client.query<{ datname: string }>(
      `SELECT datname FROM pg_database WHERE datname LIKE 'test\\_%'`,
    );
    return found.rows.map((row) => row.datname);
  });
  await withClient(onDatabase(adminUrl, 'postgres'), async (client) => {
    for (const name of names) {
      await client.query(`DROP DATABASE IF EXISTS ${client.escapeIdentifier(name)} WITH (FORCE)`);
    }
  });
}
