import { QueryTypes } from 'sequelize';
import { type SessionData } from 'express-session';
import { database } from '../../database/connection';

export interface StoredSession {
  sid: string;
  sess: SessionData;
}

/** The sessions of a person that have not run out, latest used first. */
export function storedSessions(personId: string): Promise<StoredSession[]> {
  return database().sequelize.query<StoredSession>(
    `SELECT sid, sess FROM sessions WHERE sess -> 'passport' ->> 'user' = :personId AND expire > now()
     ORDER BY (sess ->> 'lastUsedAt')::bigint DESC`,
    { replacements: { personId }, type: QueryTypes.SELECT },
  );
}

/** Removes the rows of sessions that have run out; the nightly job calls it. */
export async function pruneSessions(): Promise<number> {
  const rows = await database().sequelize.query<{ sid: string }>(
    'DELETE FROM sessions WHERE expire < now() RETURNING sid',
    { type: QueryTypes.SELECT },
  );
  await database().sequelize.query('DELETE FROM rate_limits WHERE expire < :now', {
    replacements: { now: Date.now() },
  });
  return rows.length;
}
