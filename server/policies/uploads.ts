import { type LotState } from '@shared/contract/lots';
import { type Actor } from '../http/actor';

export interface UploadFacts {
  state: 'queued' | 'running' | 'done' | 'failed' | 'withdrawn';
  uploadedBy: string | null;
  lotState: LotState;
}

/** States in which the lot still stands open to a change of its readings. */
const settled: LotState[] = ['accepted', 'accepted_under_concession', 'rejected'];

/**
 * Technicians take back their own files, quality engineers any; never while it is being read, and never once the lot is
 * settled by a signature.
 */
export function mayWithdraw(actor: Actor, upload: UploadFacts): boolean {
  if (!['done', 'queued'].includes(upload.state)) return false;
  if (settled.includes(upload.lotState)) return false;
  if (actor.role === 'quality_engineer') return true;
  return actor.role === 'technician' && upload.uploadedBy === actor.id;
}

/** Why an upload cannot be withdrawn, in a sentence. */
export function whyNotWithdraw(actor: Actor, upload: UploadFacts): string {
  switch (upload.state) {
    case 'withdrawn':
      return 'This upload is withdrawn already.';
    case 'failed':
      return 'This upload failed: none of its readings count, so there is nothing to withdraw.';
    case 'running':
      return 'This upload is being read. Wait until it has finished.';
    default:
  }
  if (settled.includes(upload.lotState))
    return 'The lot is settled by a signed disposition that rests on these readings.';
  return 'Only the person who uploaded it or a quality engineer may withdraw it.';
}

export function mayClearWarnings(actor: Actor, upload: UploadFacts): boolean {
  return actor.role === 'quality_engineer' && upload.state === 'done';
}
