import { randomBytes } from 'node:crypto';
import { act } from '../../server/history/act';
import { type Actor } from '../../server/http/actor';
import {
  Analysis,
  Disposition,
  Hold,
  Lot,
  Part,
  PartRevision,
  type Person,
  type Supplier,
} from '../../server/models';
import { openHold } from '../../server/services/holds/open-hold';
import { type Api } from './api';

export const strip = {
  unitsCount: 200,
  meanPpm: 1.88,
  sdPpm: 2.44,
  lowLimitPpm: -10,
  highLimitPpm: 10,
  guardBandPpm: 1,
  allowanceLowPpm: -19.4,
  allowanceHighPpm: 19.4,
  histogram: { edgesPpm: [-6, -4, -2, 0, 2, 4, 6, 8], counts: [3, 10, 30, 60, 50, 30, 14] },
  beyondPpm: [-12.9, 10.8, 11.6],
  beyondCount: 3,
};

export function actorFor(person: Person): Actor {
  const { id, name, role, supplierId } = person;
  return { kind: 'person', id, name, role, supplierId, address: '' };
}

interface Wishes {
  supplier?: Supplier;
  lotNumber?: string;
  acknowledgementDays?: number;
  answerDays?: number;
}

/** A lot with the rows a signed hold leaves behind, written by the models; not through the signing itself. */
export async function heldLotRows(api: Api, { supplier, lotNumber }: Wishes = {}) {
  const mark = randomBytes(4).toString('hex');
  const { technician, quality } = api.people;
  const part = await Part.create({ partNumber: `TX26-${mark}`, deviceKind: 'crystal' });
  const revision = await PartRevision.create({
    partId: part.id,
    revision: 'A',
    nominalFrequencyHz: '16000000',
    criteria: {} as never,
    createdBy: quality.id,
  });
  const lot = await Lot.create({
    lotNumber: lotNumber ?? `L-${mark}`,
    supplierId: (supplier ?? api.suppliers.first).id,
    partId: part.id,
    partRevisionId: revision.id,
    dateCode: '2644',
    purchaseOrder: 'PO-7',
    lotSize: 3000,
    receivedOn: '2026-03-02',
    state: 'on_hold',
    unitsPlanned: 200,
    registeredBy: technician.id,
  });
  const analysis = await Analysis.create({
    lotId: lot.id,
    version: 1,
    dataVersion: 1,
    methodVersion: '1',
    inputHash: mark,
    criteriaHash: mark,
    criteria: {} as never,
    resultText: '{}',
    resultHash: mark,
  });
  const disposition = (decision: 'hold' | 'reject', number: number) =>
    Disposition.create({
      lotId: lot.id,
      number,
      dataVersion: 1,
      analysisId: analysis.id,
      decision,
      reason: 'Three units beyond the limits.',
      state: decision === 'hold' ? 'superseded' : 'in_force',
      ...(decision === 'reject' ? { treatment: 'return_to_supplier' as const } : {}),
      contentHash: mark,
      signedBy: quality.id,
      signedAt: new Date(),
    });
  return { lot, part, analysis, disposition };
}

/** A hold opened as signing opens it, in one act. */
export async function heldLot(api: Api, wishes: Wishes = {}) {
  const rows = await heldLotRows(api, wishes);
  const disposition = await rows.disposition('hold', 1);
  const actor = actorFor(api.people.quality);
  const hold = await act(actor, 'disposition.sign', async (transaction) => {
    const opened = await openHold(transaction, {
      ...rows,
      disposition,
      actor,
      acknowledgementDays: wishes.acknowledgementDays ?? 2,
      answerDays: wishes.answerDays ?? 10,
      reason: 'Three units beyond the limits.',
      findingSentences: ['3 of 200 units are beyond ±10 ppm; the plan accepts 1.'],
      strip,
    });
    return { result: opened, entry: { recordType: 'lot', recordId: rows.lot.id } };
  });
  return { ...rows, hold: await Hold.findByPk(hold.id).then((row) => row!) };
}
