import { type z } from 'zod';
import { type RegisterLot } from '@shared/contract/lots';
import { act } from '../../history/act';
import { type Actor } from '../../http/actor';
import { Conflict, InvalidInput } from '../../http/errors';
import { Lot, LotReceiver, Part, Supplier } from '../../models';
import { findLotByNumber } from './find-lot';
import { criteriaAtReceipt, inspectionFor } from './criteria-at-receipt';

/** Act `lot.register`: the lot is bound to the criteria in force on the day it came, whatever is changed later. */
export function registerLot(actor: Actor, input: z.output<typeof RegisterLot>): Promise<string> {
  return act(actor, 'lot.register', async (transaction) => {
    refuseFutureDay(input.receivedOn);
    const twin = await findLotByNumber(input.lotNumber, transaction);
    if (twin)
      throw new Conflict('lot.exists', `Lot ${twin.lotNumber} is registered already.`, {
        lotNumber: 'This lot number is registered already.',
      });
    const supplier = await Supplier.findByPk(input.supplierId, { transaction });
    if (!supplier?.active)
      throw new InvalidInput('This supplier is not in use.', {
        supplierId: 'Choose a supplier in use.',
      });
    const part = await Part.findByPk(input.partId, { transaction });
    if (!part?.active)
      throw new InvalidInput('This part is not in use.', { partId: 'Choose a part in use.' });

    const { partRevision, receiverRevisions } = await criteriaAtReceipt(
      transaction,
      part.id,
      input.receivedOn,
    );
    if (!partRevision)
      throw new Conflict(
        'lot.no_criteria',
        `Part ${part.partNumber} has no revision to judge by. Ask an administrator to draft one.`,
        { partId: 'No revision to judge by.' },
      );
    const { severity, reasons, plan } = await inspectionFor(transaction, {
      ...input,
      rule: partRevision.criteria.samplingRule,
    });
    const lot = await Lot.create(
      {
        ...input,
        partRevisionId: partRevision.id,
        severity,
        severityReasons: reasons,
        unitsPlanned: plan.sampleSize,
        registeredBy: actor.id,
      },
      { transaction },
    );
    await LotReceiver.bulkCreate(
      receiverRevisions.map((revision) => ({ lotId: lot.id, receiverRevisionId: revision.id })),
      { transaction },
    );
    return {
      result: lot.id,
      entry: {
        recordType: 'lot',
        recordId: lot.id,
        lotId: lot.id,
        after: {
          ...input,
          state: 'received',
          partRevisionId: partRevision.id,
          partRevision: partRevision.revision,
          receiverRevisionIds: receiverRevisions.map((revision) => revision.id).sort(),
          severity,
          plan: plan.description,
        },
      },
    };
  });
}

/** A day's grace, because the person's calendar may be ahead of the server's. */
function refuseFutureDay(receivedOn: string) {
  const tomorrow = new Date(Date.now() + 24 * 3600 * 1000).toISOString().slice(0, 10);
  if (receivedOn > tomorrow)
    throw new InvalidInput('The day of receipt lies in the future.', {
      receivedOn: 'This day has not come yet.',
    });
}
