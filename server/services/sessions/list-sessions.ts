import { QueryTypes } from 'sequelize';
import { type SessionData } from 'express-session';
import { config } from '../../config';
import { database } from '../../database/connection';

export interface StoredSession {
  sid: string;
  sess: SessionData;
}

function unusedSince(): number {
  return Date.now() - config().SESSION_IDLE_MINUTES * 60_000;
}

/** The sessions of a person that have not ended, latest used first. */
export function storedSessions(personId: string): Promise<StoredSession[]> {
  return database().sequelize.query<StoredSession>(
    `SELECT sid, sess FROM sessions
     WHERE sess -> 'passport' ->> 'user' = :personId
       AND expire > now() AND (sess ->> 'lastUsedAt')::bigint > :unusedSince
     ORDER BY (sess ->> 'lastUsedAt')::bigint DESC`,
    { replacements: { personId, unusedSince: unusedSince() }, type: QueryTypes.SELECT },
  );
}

/** Removes the rows of sessions that have ended by time and of waits that are forgotten; the nightly job calls it. */
export async function pruneSessions(): Promise<number> {
  const rows = await database().sequelize.query<{ sid: string }>(
    `DELETE FROM sessions WHERE expire < now() OR (sess ->> 'lastUsedAt')::bigint < :unusedSince
     RETURNING sid`,
    { replacements: { unusedSince: unusedSince() }, type: QueryTypes.SELECT },
  );
  await database().sequelize.query('DELETE FROM rate_limits WHERE expire < :now', {
    replacements: { now: Date.now() },
  });
  return rows.length;
}
