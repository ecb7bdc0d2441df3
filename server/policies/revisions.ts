export { revisionForReceipt, revisionInForce } from '@shared/decision/revision-in-force';

/**
 * A rule is fixed beforehand: a revision may not take effect in the past once another has been in force. Only the very
 * first one may be dated back, since before it there was nothing to change.
 */
export function mayTakeEffect(
  revisions: { state: 'draft' | 'approved' | 'withdrawn' }[],
  effectiveFrom: string,
  today: string,
): boolean {
  return effectiveFrom >= today || !revisions.some((r) => r.state === 'approved');
}
