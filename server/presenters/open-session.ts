import { type z } from 'zod';
import { type OpenSession } from '@shared/contract/session';
import { type StoredSession } from '../services/sessions/list-sessions';
import { sessionMark } from '../services/sessions/session-mark';

/** What a person sees of one of the own sessions: never the id that opens it. */
export function presentSession(
  stored: StoredSession,
  currentSid: string,
): z.output<typeof OpenSession> {
  const { sid, sess } = stored;
  return {
    id: sessionMark(sid),
    device: deviceWords(sess.device),
    address: sess.address,
    startedAt: new Date(sess.startedAt).toISOString(),
    lastUsedAt: new Date(sess.lastUsedAt).toISOString(),
    current: sid === currentSid,
  };
}

/** "Firefox on Linux" out of a browser's long self-description; first match wins, as they name each other. */
export function deviceWords(userAgent: string): string {
  const browser = [
    ['Edg/', 'Edge'],
    ['OPR/', 'Opera'],
    ['Firefox/', 'Firefox'],
    ['Chrome/', 'Chrome'],
    ['Safari/', 'Safari'],
  ].find(([mark]) => userAgent.includes(mark!))?.[1];
  const system = [
    ['Android', 'Android'],
    ['iPhone', 'iPhone'],
    ['iPad', 'iPad'],
    ['Windows', 'Windows'],
    ['Mac OS', 'macOS'],
    ['Linux', 'Linux'],
  ].find(([mark]) => userAgent.includes(mark!))?.[1];
  if (!browser && !system) return 'another program';
  return [browser ?? 'a browser', system].filter(Boolean).join(' on ');
}
