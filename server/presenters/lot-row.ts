import { type LotRow } from '@shared/contract/lots';
import { type Actor } from '../http/actor';
import { nextStep } from '../policies/next-step';

/** One row of the lots query (server/services/lots/lot-query). */
export interface LotRecord {
  id: string;
  lot_number: string;
  state: LotRow['state'];
  state_since: Date;
  part_id: string;
  part_number: string;
  device_kind: LotRow['part']['deviceKind'];
  revision: string;
  nominal_frequency_hz: string;
  supplier_id: string;
  supplier_name: string;
  date_code: string;
  purchase_order: string;
  lot_size: number;
  received_on: string;
  units_measured: number;
  units_planned: number;
  beyond_count: number | null;
  finding: LotRow['finding'];
  band_strip: LotRow['bandStrip'];
  parent_lot_id: string | null;
  version: number;
  created_at: Date;
  uploads_running: number;
  second_from: string | null;
  hold_state: 'open' | 'acknowledged' | 'answered' | null;
  acknowledgement_due_at: Date | null;
  answer_due_at: Date | null;
}

export function presentLotRow(record: LotRecord, actor: Actor): LotRow {
  return {
    id: record.id,
    lotNumber: record.lot_number,
    state: record.state,
    stateSince: record.state_since.toISOString(),
    part: {
      id: record.part_id,
      partNumber: record.part_number,
      deviceKind: record.device_kind,
      revision: record.revision,
      nominalFrequencyHz: record.nominal_frequency_hz,
    },
    supplier: { id: record.supplier_id, name: record.supplier_name },
    dateCode: record.date_code,
    purchaseOrder: record.purchase_order,
    lotSize: record.lot_size,
    receivedOn: record.received_on,
    unitsMeasured: record.units_measured,
    unitsOwed: Math.max(0, record.units_planned - record.units_measured),
    unitsPlanned: record.units_planned,
    beyondCount: record.beyond_count,
    finding: record.finding,
    bandStrip: record.band_strip,
    next: nextStep(actor, {
      state: record.state,
      unitsPlanned: record.units_planned,
      unitsMeasured: record.units_measured,
      uploadsRunning: record.uploads_running,
      awaitingSecondFrom: record.second_from,
      hold: record.hold_state && {
        state: record.hold_state,
        acknowledgementDueAt: record.acknowledgement_due_at!,
        answerDueAt: record.answer_due_at!,
      },
    }),
    parentLotId: record.parent_lot_id,
    version: record.version,
    createdAt: record.created_at.toISOString(),
  };
}
