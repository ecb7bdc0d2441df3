import { QueryTypes } from 'sequelize';
import { type z } from 'zod';
import { type Health } from '@shared/contract/health';
import { database } from '../../database/connection';

type Check = z.output<typeof Health>['checks'][number];

async function rows<Row extends object>(sql: string): Promise<Row[]> {
  return database().sequelize.query<Row>(sql, { type: QueryTypes.SELECT });
}

async function databaseAnswers(): Promise<Check> {
  const started = performance.now();
  try {
    await rows('SELECT 1');
    return {
      name: 'database',
      ok: true,
      text: `Answers in ${Math.ceil(performance.now() - started)} ms.`,
    };
  } catch {
    return { name: 'database', ok: false, text: 'Does not answer.' };
  }
}

/** What keeps an answered success alive through a crash must be on: each is stated, so that nobody has to trust. */
async function durability(): Promise<Check[]> {
  const wanted: Record<string, { good: string[]; why: string }> = {
    fsync: { good: ['on'], why: 'what is committed is on the disk' },
    full_page_writes: { good: ['on'], why: 'half-written pages are healed after a crash' },
    synchronous_commit: {
      good: ['on', 'local', 'remote_write', 'remote_apply'],
      why: 'success is answered after the disk has it',
    },
    data_checksums: { good: ['on'], why: 'silent damage of the disk is noticed' },
    data_sync_retry: {
      good: ['off'],
      why: 'a failed write stops the server instead of being forgotten',
    },
  };
  const settings = await rows<{ name: string; setting: string }>(
    `SELECT name, setting FROM pg_settings WHERE name IN (${Object.keys(wanted)
      .map((name) => `'${name}'`)
      .join(', ')})`,
  );
  return settings.map(({ name, setting }) => {
    const ok = wanted[name]!.good.includes(setting);
    return {
      name,
      ok,
      text: ok
        ? `${setting}: ${wanted[name]!.why}.`
        : `${setting}, must be ${wanted[name]!.good[0]}.`,
    };
  });
}

async function checksumFailures(): Promise<Check> {
  const [row] = await rows<{ failures: string | null }>(
    'SELECT sum(checksum_failures) AS failures FROM pg_stat_database',
  );
  const failures = Number(row?.failures ?? 0);
  return {
    name: 'checksum failures',
    ok: failures === 0,
    text: failures === 0 ? 'None.' : `${failures} damaged pages were read. Restore from a backup.`,
  };
}

async function worker(): Promise<Check> {
  const [row] = await rows<{ workers: string }>(
    `SELECT count(*) AS workers FROM pg_stat_activity
     WHERE datname = current_database() AND application_name = 'quartzhold-jobs'`,
  );
  const workers = Number(row?.workers ?? 0);
  return {
    name: 'worker',
    ok: workers > 0,
    text: workers > 0 ? 'Connected.' : 'No worker is connected: uploads and mail wait.',
  };
}

async function mailQueue(): Promise<Check> {
  const [row] = await rows<{ due: string; dead: string }>(
    `SELECT count(*) FILTER (WHERE state IN ('queued', 'refused') AND next_try_at < now() - interval '10 minutes') AS due,
            count(*) FILTER (WHERE state = 'dead' AND created_at > now() - interval '7 days') AS dead
     FROM mails`,
  );
  const due = Number(row?.due ?? 0);
  const dead = Number(row?.dead ?? 0);
  return {
    name: 'mail queue',
    ok: due === 0 && dead === 0,
    text: `${due} waiting for more than 10 minutes, ${dead} given up in the last week.`,
  };
}

async function orSays(name: string, check: () => Promise<Check | Check[]>): Promise<Check[]> {
  try {
    return [await check()].flat();
  } catch {
    return [{ name, ok: false, text: 'Could not be looked at.' }];
  }
}

/** For strangers only whether the database answers; for administrators everything that can be seen from here. */
export async function readHealth(detailed: boolean): Promise<Check[]> {
  const first = await databaseAnswers();
  if (!detailed || !first.ok) return [first];
  const others = await Promise.all([
    orSays('durability', durability),
    orSays('checksum failures', checksumFailures),
    orSays('worker', worker),
    orSays('mail queue', mailQueue),
  ]);
  return [first, ...others.flat()];
}
