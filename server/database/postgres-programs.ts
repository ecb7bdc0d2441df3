import { existsSync, readdirSync } from 'node:fs';
import { join } from 'node:path';
import { ensureDebianProgram } from '../launch/debian';

export interface PostgresPrograms {
  initdb: string;
  pgCtl: string;
  major: number;
  env: NodeJS.ProcessEnv;
}

/**
 * The server programs Debian keeps under /usr/lib/postgresql/<major>/bin, the newest there is, or
 * the major an existing data folder was made with: one major cannot read another's files.
 */
export async function postgresPrograms(major?: number): Promise<PostgresPrograms> {
  const program = await ensureDebianProgram({
    packageName: major ? `postgresql-${major}` : 'postgresql',
    title: major ? `PostgreSQL ${major}` : 'PostgreSQL',
    find: (root) => findPostgres(root, major),
  });
  const folder = program.path.slice(0, -'/postgres'.length);
  return {
    initdb: join(folder, 'initdb'),
    pgCtl: join(folder, 'pg_ctl'),
    major: Number(folder.split('/').at(-2)),
    env: program.env,
  };
}

function findPostgres(root: string, major?: number): string | undefined {
  const home = `${root}/usr/lib/postgresql`;
  if (!existsSync(home)) return undefined;
  const majors = readdirSync(home)
    .map(Number)
    .filter((candidate) => (major ? candidate === major : candidate >= 13))
    .sort((a, b) => b - a);
  return majors
    .map((candidate) => `${home}/${candidate}/bin/postgres`)
    .find((path) => existsSync(path) && existsSync(path.replace(/postgres$/, 'initdb')));
}
