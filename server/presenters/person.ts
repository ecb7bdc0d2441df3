import { type Person as PersonView } from '@shared/contract/people';
import { type Person } from '../models';

export interface LatestLink {
  personId: string;
  purpose: 'invitation' | 'reset';
  mailState: 'queued' | 'accepted' | 'refused' | 'dead';
  lastAnswer: string;
  sentAt: Date | null;
  expiresAt: Date;
  usedAt: Date | null;
}

/** Expects `supplier` loaded. `delayedUntil`: the wait on sign-in, if one runs. */
export function presentPerson(
  person: Person,
  link: LatestLink | null,
  delayedUntil: Date | null,
): PersonView {
  const locks = [person.signingLockedUntil, delayedUntil]
    .map((date) => date?.getTime() ?? 0)
    .filter((time) => time > Date.now());
  return {
    id: person.id,
    name: person.name,
    email: person.email,
    role: person.role,
    supplier: person.supplier ? { id: person.supplier.id, name: person.supplier.name } : null,
    state: person.state,
    link: link && {
      purpose: link.purpose,
      mailState: link.mailState,
      lastAnswer: link.lastAnswer,
      sentAt: link.sentAt?.toISOString() ?? null,
      expiresAt: link.expiresAt.toISOString(),
      usedAt: link.usedAt?.toISOString() ?? null,
    },
    lastSignInAt: person.lastSignInAt?.toISOString() ?? null,
    lockedUntil: locks.length > 0 ? new Date(Math.max(...locks)).toISOString() : null,
    version: person.version,
    createdAt: person.createdAt.toISOString(),
  };
}
