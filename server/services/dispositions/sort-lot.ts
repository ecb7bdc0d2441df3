import { unitVerdict } from '@shared/decision/unit-verdict';
import { act } from '../../history/act';
import { type Actor } from '../../http/actor';
import { Conflict } from '../../http/errors';
import { Lot, LotReceiver, PartRevision } from '../../models';
import { analyseLot } from '../analysis/analyse-lot';
import { judgingCriteria } from '../analysis/judging-criteria';
import { connectionOf, readReadings } from '../analysis/read-readings';
import { findLotByNumber, lockLot } from '../lots/find-lot';
import { proveSigner } from '../signing/prove-signer';
import { checkDisposition } from './check-disposition';
import { changeState, closeOpenHold, writeDisposition } from './sign-disposition';

export interface Sorting {
  password: string;
  reason: string;
  analysisId: string;
  subLotNumber: string;
  treatment: 'return_to_supplier' | 'scrap';
}

/**
 * Act `lot.sort`: after every unit was measured, the units that the decision rule takes go on as a sub-lot with a decision of
 * its own; the rest is rejected with the lot.
 */
export async function sortLot(actor: Actor, lotId: string, input: Sorting): Promise<string> {
  await proveSigner(actor, input.password);
  return act(actor, 'lot.sort', async (transaction) => {
    const lot = await lockLot(lotId, transaction);
    const analysis = await checkDisposition(transaction, actor, lot, {
      decision: 'reject',
      analysisId: input.analysisId,
    });
    if (lot.unitsMeasured < lot.lotSize) {
      throw new Conflict(
        'lot.not_all_measured',
        `Sorting needs every unit measured: ${lot.unitsMeasured} of ${lot.lotSize} are.`,
      );
    }
    if (await findLotByNumber(input.subLotNumber, transaction)) {
      throw new Conflict('lot.exists', `Lot ${input.subLotNumber} is registered already.`, {
        subLotNumber: 'This lot number is registered already.',
      });
    }
    const before = { state: lot.state };
    const criteria = await judgingCriteria(transaction, lot);
    const {
      toleranceLowPpm: lowPpm,
      toleranceHighPpm: highPpm,
      decisionRule,
    } = criteria.part.criteria;
    const units = await readReadings(transaction, lot, criteria.part.criteria);
    const taken = [...units.offsetsPpm.keys()].filter(
      (i) =>
        unitVerdict(
          units.offsetsPpm[i]!,
          { lowPpm, highPpm },
          decisionRule,
          criteria.bench?.expandedUncertaintyPpm ?? 0,
        ).accepted,
    );
    if (taken.length === 0)
      throw new Conflict('lot.nothing_conforms', 'No unit conforms: reject the lot.');
    const reason = `Sorted: ${taken.length} conforming units go on as ${input.subLotNumber}, ${units.offsetsPpm.length - taken.length} are rejected. ${input.reason}`;
    const { disposition, contentHash } = await writeDisposition(transaction, actor, lot, analysis, {
      decision: 'reject',
      reason,
      analysisId: analysis.id,
      treatment: input.treatment,
    });
    await changeState(transaction, lot, 'rejected');
    await closeOpenHold(transaction, actor, lot, disposition);

    const revision = (await PartRevision.findByPk(lot.partRevisionId, { transaction }))!;
    const subLot = await Lot.create(
      {
        lotNumber: input.subLotNumber,
        supplierId: lot.supplierId,
        partId: lot.partId,
        partRevisionId: revision.id,
        dateCode: lot.dateCode,
        purchaseOrder: lot.purchaseOrder,
        lotSize: taken.length,
        receivedOn: lot.receivedOn,
        severity: lot.severity,
        severityReasons: lot.severityReasons,
        inspectAll: true,
        parentLotId: lot.id,
        unitsPlanned: taken.length,
        registeredBy: actor.id,
      },
      { transaction },
    );
    const links = await LotReceiver.findAll({ where: { lotId: lot.id }, transaction });
    await LotReceiver.bulkCreate(
      links.map(({ receiverRevisionId }) => ({ lotId: subLot.id, receiverRevisionId })),
      { transaction },
    );
    await connectionOf(transaction).query(
      `INSERT INTO sub_lot_units (lot_id, serial)
       SELECT DISTINCT $1::uuid, r.serial FROM readings r
       JOIN unnest($2::int[], $3::int[]) AS taken (upload_number, file_line) USING (upload_number, file_line)`,
      [subLot.id, taken.map((i) => units.uploadNumbers[i]), taken.map((i) => units.fileLines[i])],
    );
    await analyseLot(transaction, subLot.id);
    return {
      result: subLot.id,
      entry: {
        recordType: 'lot',
        recordId: lot.id,
        lotId: lot.id,
        before,
        after: {
          state: 'rejected',
          treatment: input.treatment,
          subLotId: subLot.id,
          subLotNumber: input.subLotNumber,
          unitsTaken: taken.length,
          unitsRejected: units.offsetsPpm.length - taken.length,
          contentHash,
        },
        reason: input.reason,
      },
    };
  });
}
