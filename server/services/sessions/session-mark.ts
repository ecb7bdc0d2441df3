import { sha256Hex } from '../../history/canonical';

/** Names a session without giving it away: whoever reads the mark cannot use the session. */
export function sessionMark(sid: string): string {
  return sha256Hex(sid).slice(0, 32);
}
