import { act } from '../../history/act';
import { type Actor } from '../../http/actor';
import { ChangedMeanwhile, Conflict, NotAllowed } from '../../http/errors';
import { PartRevision } from '../../models';
import { mayChangeLot } from '../../policies/lots';
import { analyseLot } from '../analysis/analyse-lot';
import { planOf } from './criteria-at-receipt';
import { lockLot } from './find-lot';
import { lotFacts } from './lot-facts';

export interface LotChange {
  dateCode: string;
  purchaseOrder: string;
  lotSize: number;
  version: number;
  reason: string;
}

/** Act `lot.change`: corrects what was registered, while nothing is signed. Another lot size means another plan. */
export function changeLot(actor: Actor, id: string, change: LotChange): Promise<void> {
  return act(actor, 'lot.change', async (transaction) => {
    const lot = await lockLot(id, transaction);
    const revision = (await PartRevision.findByPk(lot.partRevisionId, { transaction }))!;
    const { facts } = await lotFacts(lot, revision.criteria, transaction);
    if (!mayChangeLot(actor, facts)) {
      if (facts.everDecided)
        throw new Conflict(
          'lot.decided',
          'A decision has been signed on this lot; what was registered stays as it is.',
        );
      throw new NotAllowed();
    }
    if (lot.version !== change.version) throw new ChangedMeanwhile();
    const before = {
      dateCode: lot.dateCode,
      purchaseOrder: lot.purchaseOrder,
      lotSize: lot.lotSize,
      unitsPlanned: lot.unitsPlanned,
    };
    const { dateCode, purchaseOrder, lotSize } = change;
    const sizeChanged = lotSize !== lot.lotSize;
    lot.set({ dateCode, purchaseOrder, lotSize, version: lot.version + 1 });
    if (sizeChanged) {
      lot.set({
        unitsPlanned: planOf(lot, revision.criteria.samplingRule).sampleSize,
        dataVersion: lot.dataVersion + 1,
      });
    }
    await lot.save({ transaction });
    if (sizeChanged) await analyseLot(transaction, lot.id);
    return {
      result: undefined,
      entry: {
        recordType: 'lot',
        recordId: id,
        lotId: id,
        before,
        after: { dateCode, purchaseOrder, lotSize, unitsPlanned: lot.unitsPlanned },
        reason: change.reason,
      },
    };
  });
}
