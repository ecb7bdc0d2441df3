interface Revision {
  id: string;
  state: 'draft' | 'approved' | 'withdrawn';
  effectiveFrom: string | null;
  createdAt: Date | string;
}

/** The approved revision with the latest effective date not after `day` (ISO date). */
export function revisionInForce<R extends Revision>(
  revisions: readonly R[],
  day: string,
): R | null {
  const candidates = revisions.filter(
    (r) => r.state === 'approved' && r.effectiveFrom !== null && r.effectiveFrom <= day,
  );
  return latest(candidates, (r) => r.effectiveFrom!);
}

/**
 * What a lot received on `day` is judged by: the revision in force that day; else the first one ever approved, before
 * which there was none; else the newest draft, whose approval the lot then owes.
 */
export function revisionForReceipt<R extends Revision>(
  revisions: readonly R[],
  day: string,
): R | null {
  return (
    revisionInForce(revisions, day) ??
    earliestApproved(revisions) ??
    latest(
      revisions.filter((r) => r.state === 'draft'),
      () => '',
    )
  );
}

function earliestApproved<R extends Revision>(revisions: readonly R[]): R | null {
  const approved = revisions.filter((r) => r.state === 'approved' && r.effectiveFrom !== null);
  return approved.sort((a, b) => a.effectiveFrom!.localeCompare(b.effectiveFrom!))[0] ?? null;
}

function latest<R extends Revision>(revisions: readonly R[], key: (revision: R) => string) {
  const made = ({ createdAt }: R) => new Date(createdAt).getTime();
  const sorted = [...revisions].sort((a, b) => key(b).localeCompare(key(a)) || made(b) - made(a));
  return sorted[0] ?? null;
}
