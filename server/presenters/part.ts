import { type Part as PartView, type PartWithRevisions } from '@shared/contract/parts';
import { type Part } from '../models';
import { revisionForReceipt } from '../policies/revisions';
import { newestFirst, presentPartRevision, todayIso } from './revision';

/** Expects `revisions` (with creator and approval) and `receivers` loaded. */
export function presentPart(part: Part, lotsCount: number): PartView {
  const revisions = part.revisions ?? [];
  const current = revisionForReceipt(revisions, todayIso());
  return {
    id: part.id,
    partNumber: part.partNumber,
    deviceKind: part.deviceKind,
    description: part.description,
    active: part.active,
    revision: current ? presentPartRevision(current, revisions) : null,
    receivers: (part.receivers ?? [])
      .map(({ id, name }) => ({ id, name }))
      .sort((a, b) => a.name.localeCompare(b.name)),
    lotsCount,
    version: part.version,
  };
}

export function presentPartWithRevisions(part: Part, lotsCount: number): PartWithRevisions {
  const revisions = part.revisions ?? [];
  return {
    ...presentPart(part, lotsCount),
    revisions: newestFirst(revisions).map((r) => presentPartRevision(r, revisions)),
  };
}
