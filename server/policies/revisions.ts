interface Revision {
  id: string;
  state: 'draft' | 'approved' | 'withdrawn';
  effectiveFrom: string | null;
  createdAt: Date;
}

/** The approved revision with the latest effective date not after `day` (ISO date). */
export function revisionInForce<R extends Revision>(revisions: R[], day: string): R | null {
  const candidates = revisions.filter(
    (r) => r.state === 'approved' && r.effectiveFrom !== null && r.effectiveFrom <= day,
  );
  return latest(candidates, (r) => r.effectiveFrom!);
}

/**
 * What a lot is registered against: the revision in force that day; else the first one ever approved, before which there
 * was none; else the newest draft, whose approval the lot then owes.
 */
export function revisionForReceipt<R extends Revision>(revisions: R[], day: string): R | null {
  return (
    revisionInForce(revisions, day) ??
    earliestApproved(revisions) ??
    latest(
      revisions.filter((r) => r.state === 'draft'),
      () => '',
    )
  );
}

/**
 * A rule is fixed beforehand: a revision may not take effect in the past once another has been in force. Only the very
 * first one may be dated back, since before it there was nothing to change.
 */
export function mayTakeEffect(
  revisions: Revision[],
  effectiveFrom: string,
  today: string,
): boolean {
  return effectiveFrom >= today || !revisions.some((r) => r.state === 'approved');
}

function earliestApproved<R extends Revision>(revisions: R[]): R | null {
  const approved = revisions.filter((r) => r.state === 'approved' && r.effectiveFrom !== null);
  return approved.sort((a, b) => a.effectiveFrom!.localeCompare(b.effectiveFrom!))[0] ?? null;
}

function latest<R extends Revision>(revisions: R[], key: (revision: R) => string): R | null {
  const sorted = [...revisions].sort(
    (a, b) => key(b).localeCompare(key(a)) || b.createdAt.getTime() - a.createdAt.getTime(),
  );
  return sorted[0] ?? null;
}
