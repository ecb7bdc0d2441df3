import { type Actor } from '../http/actor';

interface OutgoingMail {
  state: 'queued' | 'accepted' | 'refused' | 'dead';
  secret: boolean;
  leaseUntil: Date | null;
}

export type ResendRefusal = 'role' | 'wiped' | 'being_sent';

/**
 * Why a mail may not be sent again, or null. What was accepted may be: accepted is not delivered. A single-use link is
 * gone from the outbox once accepted; a new link is issued instead.
 */
export function resendRefusal(actor: Actor, mail: OutgoingMail, now: Date): ResendRefusal | null {
  if (actor.role !== 'administrator' && actor.role !== 'quality_engineer') return 'role';
  if (mail.secret && mail.state === 'accepted') return 'wiped';
  if (mail.leaseUntil && mail.leaseUntil > now) return 'being_sent';
  return null;
}
