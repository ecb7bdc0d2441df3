import { type Decision } from '@shared/contract/dispositions';
import { type Actor } from '../http/actor';

/** A customer's approval comes before or after the second signature, as long as the concession may still count. */
export function mayAddApproval(
  actor: Actor,
  disposition: { decision: Decision; state: string },
): boolean {
  return (
    actor.role === 'quality_engineer' &&
    disposition.decision === 'accept_under_concession' &&
    ['awaiting_second', 'in_force'].includes(disposition.state)
  );
}
