import { clusterPublished, publishCluster, startReusableTestCluster } from './cluster';

/** Vitest global setup of the api and browser suites: a database server is there before any file runs. */
export default async function setup(): Promise<(() => Promise<void>) | undefined> {
  if (clusterPublished()) return undefined;
  const cluster = await startReusableTestCluster();
  publishCluster(cluster);
  return cluster.stop;
}
