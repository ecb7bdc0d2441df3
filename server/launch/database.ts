import { startCluster } from '../database/cluster';
import {
  closeToOthers,
  ensureDatabase,
  ensureRoles,
  onDatabase,
  withClient,
} from '../database/roles';
import { LaunchError } from './command';
import { type Running } from './running';
import { type Secrets } from './secrets';
import { type LaunchSettings } from './settings';
import { say } from './say';

export interface DatabaseUrls {
  /** The server's own, with least privilege. */
  appUrl: string;
  /** For migrations. */
  ownerUrl: string;
}

export const databaseName = 'quartzhold';

/** The database named by the settings, or one in a cluster of Quartzhold's own. */
export async function openDatabase(
  settings: LaunchSettings,
  secrets: Secrets,
  running: Running,
): Promise<DatabaseUrls> {
  if (settings.databaseUrl) return givenDatabase(settings, secrets);
  const cluster = await running.acquire(() => startCluster({ name: 'postgres', durable: true }));
  await ensureDatabase(cluster.adminUrl, databaseName);
  return {
    appUrl: onDatabase(cluster.appUrl, databaseName),
    ownerUrl: onDatabase(cluster.ownerUrl, databaseName),
  };
}

/**
 * Two addresses name both roles. One address alone must be an administrator's: then the two roles
 * are made on that server, so that Quartzhold itself never works with more rights than it needs.
 */
async function givenDatabase(settings: LaunchSettings, secrets: Secrets): Promise<DatabaseUrls> {
  const given = settings.databaseUrl!;
  if (settings.databaseOwnerUrl) {
    return { appUrl: given, ownerUrl: settings.databaseOwnerUrl };
  }
  if (!(await isAdministrator(given))) {
    throw new LaunchError(
      'setting_missing',
      'Setting DATABASE_OWNER_URL is missing: DATABASE_URL is not an administrator, so name the role that owns the schema too.',
    );
  }
  const passwords = { owner: secrets.ownerPassword, app: secrets.appPassword };
  await ensureRoles(given, passwords);
  // The server's own maintenance database is not taken over.
  const named = new URL(given).pathname.slice(1);
  const name = named && named !== 'postgres' ? named : databaseName;
  await ensureDatabase(given, name);
  await closeToOthers(onDatabase(given, name));
  say(`DATABASE_URL is an administrator: Quartzhold works as quartzhold_owner and quartzhold_app.`);
  const as = (role: string, password: string) => {
    const url = new URL(onDatabase(given, name));
    url.username = role;
    url.password = password;
    return url.href;
  };
  return {
    appUrl: as('quartzhold_app', passwords.app),
    ownerUrl: as('quartzhold_owner', passwords.owner),
  };
}

async function isAdministrator(url: string): Promise<boolean> {
  try {
    return await withClient(url, async (client) => {
      const role = await client.query<{ rolsuper: boolean }>(
        'SELECT rolsuper FROM pg_roles WHERE rolname = current_user',
      );
      return role.rows[0]?.rolsuper ?? false;
    });
  } catch (error) {
    throw new LaunchError(
      'database_unreachable',
      `The database of DATABASE_URL does not answer: ${(error as Error).message || String(error)}`,
    );
  }
}

/** True while nobody has been entered: only then may the demo be filled in. */
export async function isEmpty(ownerUrl: string): Promise<boolean> {
  return withClient(ownerUrl, async (client) => {
    const people = await client.query('SELECT 1 FROM people LIMIT 1');
    return people.rowCount === 0;
  });
}
