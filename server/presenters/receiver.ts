import {
  type Receiver as ReceiverView,
  type ReceiverWithRevisions,
} from '@shared/contract/receivers';
import { radioReceiver } from '@shared/analysis/drift';
import { receiverAllowance } from '@shared/radio/allowance';
import { type Receiver } from '../models';
import { revisionForReceipt } from '../policies/revisions';
import { newestFirst, presentReceiverRevision, todayIso } from './revision';

/** Expects `revisions` (with creator and approval) and `parts` loaded. */
export function presentReceiver(receiver: Receiver): ReceiverView {
  const revisions = receiver.revisions ?? [];
  const current = revisionForReceipt(revisions, todayIso());
  const allowance = current ? receiverAllowance(radioReceiver(current.criteria)) : null;
  return {
    id: receiver.id,
    name: receiver.name,
    description: receiver.description,
    active: receiver.active,
    revision: current ? presentReceiverRevision(current, revisions) : null,
    allowance: allowance && {
      totalHz: allowance.totalHz,
      totalPpm: allowance.totalPpm,
      forUnitPpm: allowance.remainsPpm,
    },
    parts: (receiver.parts ?? [])
      .map(({ id, partNumber }) => ({ id, partNumber }))
      .sort((a, b) => a.partNumber.localeCompare(b.partNumber)),
    version: receiver.version,
  };
}

export function presentReceiverWithRevisions(receiver: Receiver): ReceiverWithRevisions {
  const revisions = receiver.revisions ?? [];
  return {
    ...presentReceiver(receiver),
    revisions: newestFirst(revisions).map((r) => presentReceiverRevision(r, revisions)),
  };
}
