import pg from 'pg';

export const ownerRole = 'quartzhold_owner';
export const appRole = 'quartzhold_app';

export interface RolePasswords {
  owner: string;
  app: string;
}

/**
 * The two roles Quartzhold works with. The owner owns the schema and runs migrations; the app may
 * do only what migrations grant it, so that it cannot change the history it writes.
 */
export async function ensureRoles(adminUrl: string, passwords: RolePasswords): Promise<void> {
  await withClient(adminUrl, async (client) => {
    for (const [role, password] of [
      [ownerRole, passwords.owner],
      [appRole, passwords.app],
    ] as const) {
      const known = await client.query('SELECT 1 FROM pg_roles WHERE rolname = $1', [role]);
      await client.query(
        `${known.rowCount ? 'ALTER' : 'CREATE'} ROLE ${role} LOGIN NOSUPERUSER NOCREATEDB NOCREATEROLE
         NOREPLICATION NOBYPASSRLS PASSWORD ${client.escapeLiteral(password)}`,
      );
    }
  });
}

/**
 * A database owned by the owner role, closed to everybody but the two roles; copied from `template`
 * if given. True when it was made now. Privileges on a database are not copied with it, so they are
 * set here and not in a migration.
 */
export async function ensureDatabase(
  adminUrl: string,
  name: string,
  template?: string,
): Promise<boolean> {
  const made = await withClient(adminUrl, async (client) => {
    const known = await client.query('SELECT 1 FROM pg_database WHERE datname = $1', [name]);
    if (known.rowCount) return false;
    const database = client.escapeIdentifier(name);
    const source = template ? ` TEMPLATE ${client.escapeIdentifier(template)}` : '';
    await client.query(`CREATE DATABASE ${database} OWNER ${ownerRole}${source}`);
    return true;
  });
  if (made) await closeToOthers(onDatabase(adminUrl, name));
  return made;
}

/** Hands the database of this address to the owner role and closes it to everybody but the two roles. */
export async function closeToOthers(adminUrl: string): Promise<void> {
  await withClient(adminUrl, async (client) => {
    const database = client.escapeIdentifier(new URL(adminUrl).pathname.slice(1));
    await client.query(`ALTER DATABASE ${database} OWNER TO ${ownerRole}`);
    await client.query(`REVOKE ALL ON DATABASE ${database} FROM PUBLIC`);
    await client.query(`GRANT CONNECT, TEMPORARY ON DATABASE ${database} TO ${appRole}`);
    await client.query(`ALTER SCHEMA public OWNER TO ${ownerRole}`);
    await client.query('REVOKE ALL ON SCHEMA public FROM PUBLIC');
    await client.query(`GRANT USAGE ON SCHEMA public TO ${appRole}`);
  });
}

/** The same server and role, another database. */
export function onDatabase(url: string, name: string): string {
  const changed = new URL(url);
  changed.pathname = `/${name}`;
  return changed.href;
}

export async function withClient<T>(
  url: string,
  act: (client: pg.Client) => Promise<T>,
): Promise<T> {
  const client = new pg.Client({ connectionString: url });
  client.on('error', () => undefined);
  await client.connect();
  try {
    return await act(client);
  } finally {
    await client.end();
  }
}
