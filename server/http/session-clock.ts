import { type Request } from 'express';
import { type SessionData } from 'express-session';
import { config } from '../config';
import { database } from '../database/connection';

const ends = new WeakMap<Request, Date>();

function lengths() {
  return {
    idleMs: config().SESSION_IDLE_MINUTES * 60_000,
    absoluteMs: config().SESSION_ABSOLUTE_HOURS * 3_600_000,
  };
}

/** When a session ends if nobody touches it: idle end or absolute end, whichever is first. */
export function sessionEnd(data: Pick<SessionData, 'startedAt' | 'lastUsedAt'>): Date {
  const { idleMs, absoluteMs } = lengths();
  return new Date(Math.min(data.startedAt + absoluteMs, data.lastUsedAt + idleMs));
}

/** The end of the session of this request, as of this request. */
export function endOfSession(request: Request): Date {
  return ends.get(request) ?? sessionEnd(request.session as SessionData);
}

/** Event streams and polls run without anybody at the desk; they must not keep a session alive. */
export function isBackground(request: Request): boolean {
  return (
    request.get('x-quartzhold-background') === '1' ||
    (request.get('accept') ?? '').includes('text/event-stream')
  );
}

/**
 * Moves the idle end. Written straight to the row and only where the row still is, never through the session object:
 * nothing is left for the end of a slow request to save.
 */
export async function touchSession(request: Request): Promise<void> {
  const data = request.session as SessionData;
  const now = Date.now();
  ends.set(request, sessionEnd(data));
  if (isBackground(request)) return;
  ends.set(request, sessionEnd({ startedAt: data.startedAt, lastUsedAt: now }));
  const worthWritingMs = Math.min(30_000, lengths().idleMs / 20);
  if (now - data.lastUsedAt < worthWritingMs) return;
  await database().pool.query(
    `UPDATE sessions SET sess = jsonb_set(sess::jsonb, '{lastUsedAt}', to_jsonb($2::bigint))::json WHERE sid = $1`,
    [request.sessionID, now],
  );
}
