import { type Request } from 'express';
import session, { type SessionData } from 'express-session';
import connectPgSimple from 'connect-pg-simple';
import { database } from '../database/connection';
import { config } from '../config';

const PgStore = connectPgSimple(session);
const signingIn = new WeakSet<object>();

/** Only a request that signs somebody in may make a session row. */
export function allowNewSession(request: Request): void {
  signingIn.add(request);
}

/**
 * Sessions in PostgreSQL. A row is made at sign-in and never again: a slow request that saves its session after the
 * person signed out finds no row and changes nothing, so a session that has ended stays ended.
 */
export class SessionStore extends PgStore {
  constructor() {
    super({
      pool: database().pool,
      tableName: 'sessions',
      ttl: config().SESSION_ABSOLUTE_HOURS * 3600,
      disableTouch: true,
      pruneSessionInterval: false,
      errorLog: () => undefined,
    });
  }

  override set(sid: string, data: SessionData, done?: (error?: unknown) => void): void {
    const request = (data as unknown as { req?: object }).req;
    if (request && signingIn.delete(request)) {
      super.set(sid, data, done);
      return;
    }
    database()
      .pool.query('UPDATE sessions SET sess = $2 WHERE sid = $1', [sid, data])
      .then(
        () => done?.(),
        (error: unknown) => done?.(error),
      );
  }
}
