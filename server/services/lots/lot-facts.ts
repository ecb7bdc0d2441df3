import { QueryTypes, type Transaction } from 'sequelize';
import { type OwedFacts } from '../../policies/owed';
import { owedItems } from '../../policies/owed';
import { type LotFacts } from '../../policies/lots';
import { Lot } from '../../models';

interface Row {
  uploads_running: number;
  open_warnings: number;
  bench_out: string | null;
  criteria_approved: boolean;
  live_decision: string | null;
  live_state: string | null;
  live_signer: string | null;
  live_data_version: number | null;
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
         WHERE u.lot_id = l.id AND u.state = 'done' AND NOT coalesce((w ->> 'cleared')::boolean, false)) AS open_warnings,
       (SELECT min(b.name) FROM uploads u JOIN benches b ON b.id = u.bench_id
         WHERE u.lot_id = l.id AND u.state = 'done' AND u.bench_in_calibration = false) AS bench_out,
       (pr.state = 'approved' AND NOT EXISTS (
         SELECT FROM lot_receivers lr JOIN receiver_revisions rr ON rr.id = lr.receiver_revision_id
         WHERE lr.lot_id = l.id AND rr.state <> 'approved')) AS criteria_approved,
       d.decision AS live_decision, d.state AS live_state, d.signed_by AS live_signer, d.data_version AS live_data_version,
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
    requireBenchInCalibration: criteria.requireBenchInCalibration,
    unitsLackingTemperatures: lot.unitsLackingTemperatures,
    requiredTemperaturesC: criteria.requiredTemperaturesC,
    discontinued: lot.severity === 'discontinued',
  };
  const owed = owedItems(owedFacts);
  const lotFactsForPolicy: LotFacts = {
    state: lot.state,
    hasAnalysis: lot.currentAnalysisId !== null,
    inspectedSinceHold:
      facts.live_decision === 'hold' && lot.dataVersion > (facts.live_data_version ?? 0),
    awaitingSecondFrom: facts.live_state === 'awaiting_second' ? facts.live_signer : null,
    owes: owed.length > 0,
    everDecided: facts.ever_decided,
  };
  return { owed, facts: lotFactsForPolicy };
}
