import { type z } from 'zod';
import { type RevisionHead } from '@shared/contract/revisions';
import { type PartRevision as PartRevisionView } from '@shared/contract/parts';
import { type ReceiverRevision as ReceiverRevisionView } from '@shared/contract/receivers';
import { type PartRevision, type ReceiverRevision } from '../models';
import { revisionInForce } from '../policies/revisions';
import { presentSignature } from './signature';

export function todayIso(): string {
  return new Date().toISOString().slice(0, 10);
}

function head(
  revision: PartRevision | ReceiverRevision,
  inForceId: string | undefined,
): z.infer<typeof RevisionHead> {
  return {
    id: revision.id,
    revision: revision.revision,
    state: revision.state,
    effectiveFrom: revision.effectiveFrom,
    changeNote: revision.changeNote,
    createdBy: { id: revision.createdBy, name: revision.creator?.name ?? '' },
    createdAt: revision.createdAt.toISOString(),
    approval: revision.approval ? presentSignature(revision.approval) : null,
    inForce: revision.id === inForceId,
    version: revision.version,
  };
}

export function presentPartRevision(
  revision: PartRevision,
  siblings: PartRevision[] = [revision],
): PartRevisionView {
  return {
    ...head(revision, revisionInForce(siblings, todayIso())?.id),
    partId: revision.partId,
    criteria: revision.criteria,
  };
}

export function presentReceiverRevision(
  revision: ReceiverRevision,
  siblings: ReceiverRevision[] = [revision],
): ReceiverRevisionView {
  return {
    ...head(revision, revisionInForce(siblings, todayIso())?.id),
    receiverId: revision.receiverId,
    criteria: revision.criteria,
  };
}

/** Newest first: by effective date, drafts on top. */
export function newestFirst<R extends { effectiveFrom: string | null; createdAt: Date }>(
  revisions: R[],
): R[] {
  return [...revisions].sort(
    (a, b) =>
      (b.effectiveFrom ?? '9999').localeCompare(a.effectiveFrom ?? '9999') ||
      b.createdAt.getTime() - a.createdAt.getTime(),
  );
}
