import { QueryTypes, type Transaction } from 'sequelize';
import { type OwedFacts } from '../../policies/owed';
import { owedItems } from '../../policies/owed';
import { type LotFacts } from '../../policies/lots';
import { Lot } from '../../models';

interface Row {
  uploads_running: number;
  open_warnings: number;
  bench_out: string | null;
  bench_unknown: boolean;
  criteria_approved: boolean;
  live_state: string | null;
  live_signer: string | null;
  inspected_since: boolean;
  ever_decided: boolean;
}

/** Gathers in one query what the policies ask of a lot. */
export async function lotFacts(
  lot: Lot,
  criteria: { requireBenchInCalibration: boolean; requiredTemperaturesC: number[] },
  transaction?: Transaction,
) {
  const [row] = await Lot.sequelize!.query<Row>(
    `SELECT
       (SELECT count(*)::int FROM uploads u WHERE u.lot_id = l.id AND u.state IN ('queued', 'running')) AS uploads_running,
       (SELECT count(*)::int FROM uploads u, jsonb_array_elements(u.warnings) w
         WHERE u.lot_id IN (l.id, l.parent_lot_id) AND u.state = 'done' AND NOT coalesce((w ->> 'cleared')::boolean, false)) AS open_warnings,
       (SELECT min(b.name) FROM uploads u JOIN benches b ON b.id = u.bench_id
         WHERE u.lot_id IN (l.id, l.parent_lot_id) AND u.state = 'done' AND u.rows_taken > 0 AND u.bench_in_calibration = false) AS bench_out,
       EXISTS (SELECT FROM uploads u
         WHERE u.lot_id IN (l.id, l.parent_lot_id) AND u.state = 'done' AND u.rows_taken > 0 AND u.bench_id IS NULL) AS bench_unknown,
       (pr.state = 'approved' AND NOT EXISTS (
         SELECT FROM lot_receivers lr JOIN receiver_revisions rr ON rr.id = lr.receiver_revision_id
         WHERE lr.lot_id = l.id AND rr.state <> 'approved')) AS criteria_approved,
       d.state AS live_state, d.signed_by AS live_signer,
       -- Readings that arrived after the hold was signed; a change of criteria or a withdrawal inspects nothing.
       EXISTS (SELECT FROM uploads u
         WHERE u.lot_id = l.id AND u.state = 'done' AND u.rows_taken > 0 AND u.created_at >
           (SELECT max(h.signed_at) FROM dispositions h WHERE h.lot_id = l.id AND h.decision = 'hold')) AS inspected_since,
       EXISTS (SELECT FROM dispositions x WHERE x.lot_id = l.id) AS ever_decided
     FROM lots l
     JOIN part_revisions pr ON pr.id = l.part_revision_id
     LEFT JOIN dispositions d ON d.lot_id = l.id AND d.state IN ('awaiting_second', 'in_force')
     WHERE l.id = :id`,
    { replacements: { id: lot.id }, type: QueryTypes.SELECT, transaction },
  );
  const facts = row!;
  const owedFacts: OwedFacts = {
    unitsPlanned: lot.unitsPlanned,
    unitsMeasured: lot.unitsMeasured,
    hasAnalysis: lot.currentAnalysisId !== null,
    uploadsRunning: facts.uploads_running,
    openWarnings: facts.open_warnings,
    criteriaApproved: facts.criteria_approved,
    benchOutOfCalibration: facts.bench_out,
    benchUnknown: facts.bench_unknown,
    requireBenchInCalibration: criteria.requireBenchInCalibration,
    unitsLackingTemperatures: lot.unitsLackingTemperatures,
    requiredTemperaturesC: criteria.requiredTemperaturesC,
    unitsLackingResistance: lot.unitsLackingResistance,
    discontinued: lot.severity === 'discontinued',
  };
  const owed = owedItems(owedFacts);
  const lotFactsForPolicy: LotFacts = {
    state: lot.state,
    hasAnalysis: lot.currentAnalysisId !== null,
    inspectedSinceHold: lot.state === 'on_hold' && facts.inspected_since,
    everyUnitOrdered: lot.inspectAll,
    awaitingSecondFrom: facts.live_state === 'awaiting_second' ? facts.live_signer : null,
    owes: owed.length > 0,
    everDecided: facts.ever_decided,
  };
  return { owed, facts: lotFactsForPolicy };
}
