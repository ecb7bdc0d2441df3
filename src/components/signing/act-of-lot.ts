import { type Disposition } from '@shared/contract/dispositions';
import { type Lot } from '@shared/contract/lots';

export type LotAct =
  { kind: 'decide' } | { kind: 'second'; disposition: Disposition; isOwn: boolean };

/** What a person may do with a lot: decide, sign second, or take back an own first signature; null: nothing. */
export function actOf(
  lot: Lot,
  dispositions: readonly Disposition[],
  personId: string | null,
): LotAct | null {
  const waiting = dispositions.find(({ state }) => state === 'awaiting_second');
  if (waiting && lot.may.countersign) return { kind: 'second', disposition: waiting, isOwn: false };
  if (waiting && waiting.signedBy.id === personId)
    return { kind: 'second', disposition: waiting, isOwn: true };
  return lot.may.decide.length > 0 ? { kind: 'decide' } : null;
}
