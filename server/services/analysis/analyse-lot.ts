import { QueryTypes, type Transaction } from 'sequelize';
import { analyseLot as analyse, canAnalyse, METHOD_VERSION } from '@shared/analysis/analyse-lot';
import { type AnalysisCriteria } from '@shared/analysis/criteria';
import { type MeasuredUnits, type UnitPlace } from '@shared/analysis/units';
import { type AnalysisResult } from '@shared/contract/analysis';
import { type LotState } from '@shared/contract/lots';
import { canonicalJson, sha256Hex } from '../../history/canonical';
import { Analysis, Disposition, Lot, Upload } from '../../models';
import { restoreHold } from '../dispositions/restore-hold';
import { lockLot } from '../lots/find-lot';
import { planOf } from '../lots/criteria-at-receipt';
import { connectionOf, readReadings, type LotReadings } from './read-readings';
import { judgingCriteria } from './judging-criteria';

/**
 * Analyses a lot anew in the transaction that changed its readings or criteria: once per set of readings. Signatures that
 * rested on the earlier set stay with the earlier analysis; an acceptance among them no longer counts.
 * @param gathered what an import found while it streamed, when the lot has no other readings; else they are read back
 */
export async function analyseLot(
  transaction: Transaction,
  lotId: string,
  gathered?: LotReadings,
): Promise<void> {
  const lot = await lockLot(lotId, transaction);
  const criteria = await judgingCriteria(transaction, lot);
  const units = gathered ?? (await readReadings(transaction, lot, criteria.part.criteria));
  const overtaken = await overtakeDecisions(transaction, lot);
  const plan = planOf(lot, criteria.part.criteria.samplingRule);
  lot.set({
    unitsPlanned: plan.sampleSize,
    unitsMeasured: units.offsetsPpm.length,
    unitsLackingTemperatures: units.unitsLackingTemperatures,
    unitsLackingResistance:
      criteria.part.criteria.greatestResistanceOhm === null ? 0 : units.unitsLackingResistance,
  });
  if (canAnalyse(units)) await keepAnalysis(transaction, lot, criteria, units);
  else
    lot.set({
      currentAnalysisId: null,
      beyondCount: null,
      finding: null,
      planMet: null,
      bandStrip: null,
    });
  moveOn(lot, overtaken, units.readings > 0);
  await lot.save({ transaction });
}

async function keepAnalysis(
  transaction: Transaction,
  lot: Lot,
  criteria: AnalysisCriteria,
  units: MeasuredUnits,
) {
  const uploads = await uploadsOf(transaction, lot);
  const serials = new Serials(transaction, uploads);
  const refusedRows = uploads.reduce((sum, upload) => sum + upload.rowsRefused, 0);
  // The listed units are known only once the analysis is made: it is made first with places, then the serials are filled in.
  const places: UnitPlace[] = [];
  const { result, sortedPpm } = analyse({
    units,
    criteria,
    refusedRows,
    identify: (place) => {
      places.push(place);
      return {
        serial: placeKey(place),
        uploadId: uploads.find((upload) => upload.number === place.uploadNumber)?.id ?? '',
      };
    },
  });
  nameUnits(result, await serials.lookUp(places));
  const resultText = canonicalJson(result);
  const version =
    ((await Analysis.max<number, Analysis>('version', { where: { lotId: lot.id }, transaction })) ??
      0) + 1;
  const analysis = await Analysis.create(
    {
      lotId: lot.id,
      version,
      dataVersion: lot.dataVersion,
      methodVersion: METHOD_VERSION,
      inputHash: inputHash(uploads),
      criteria,
      criteriaHash: sha256Hex(canonicalJson(criteria)),
      resultText,
      resultHash: sha256Hex(resultText),
    },
    { transaction },
  );
  await connectionOf(transaction).query(
    'INSERT INTO analysis_offsets (analysis_id, bytes) VALUES ($1, $2)',
    [analysis.id, Buffer.from(sortedPpm.buffer, sortedPpm.byteOffset, sortedPpm.byteLength)],
  );
  lot.set({
    currentAnalysisId: analysis.id,
    beyondCount: result.beyond.limits.count,
    finding: result.finding.decision,
    planMet: result.sampling.met,
    bandStrip: result.bandStrip,
  });
}

/** Done uploads whose readings belong to the lot; a sub-lot stands on its parent's. */
function uploadsOf(transaction: Transaction, lot: Lot): Promise<Upload[]> {
  return Upload.findAll({
    where: { lotId: lot.parentLotId ? [lot.id, lot.parentLotId] : lot.id, state: 'done' },
    order: ['number'],
    transaction,
  });
}

/** The same files, read in the same way, with the same rows taken, give the same hash; anything else gives another. */
function inputHash(uploads: Upload[]): string {
  return sha256Hex(
    canonicalJson(
      uploads.map(({ id, sha256, mapping, rowsTaken, rowsRefused, readingsSha256 }) => ({
        id,
        sha256,
        mapping,
        rowsTaken,
        rowsRefused,
        readingsSha256,
      })),
    ),
  );
}

/** Decisions signed on earlier readings or criteria: acceptances and waiting concessions fall, a hold stays a hold. */
async function overtakeDecisions(transaction: Transaction, lot: Lot): Promise<boolean> {
  const live = await Disposition.findOne({
    where: { lotId: lot.id, state: ['awaiting_second', 'in_force'] },
    transaction,
  });
  if (!live || live.dataVersion >= lot.dataVersion) return false;
  if (live.decision === 'hold' || live.decision === 'reject') return false;
  await live.update(
    { state: live.decision === 'inspect_all' ? 'superseded' : 'overtaken' },
    { transaction },
  );
  await restoreHold(transaction, lot);
  return live.decision !== 'inspect_all';
}

function moveOn(lot: Lot, overtaken: boolean, anyReadings: boolean): void {
  const held: LotState[] = ['on_hold', 'rejected'];
  const settled: LotState[] = ['accepted', 'accepted_under_concession'];
  if (held.includes(lot.state) || (settled.includes(lot.state) && !overtaken)) return;
  const next: LotState = !anyReadings
    ? 'received'
    : lot.unitsMeasured >= lot.unitsPlanned
      ? 'awaiting_disposition'
      : 'under_inspection';
  if (next !== lot.state) lot.set({ state: next, stateSince: new Date() });
}

const placeKey = (place: UnitPlace) => `${place.uploadNumber}:${place.fileLine}`;

/** Looks up serials of listed units in one query. */
class Serials {
  constructor(
    private readonly transaction: Transaction,
    private readonly uploads: Upload[],
  ) {}

  async lookUp(places: UnitPlace[]): Promise<Map<string, string>> {
    const serials = new Map<string, string>();
    for (const upload of this.uploads) {
      const lines = [
        ...new Set(
          places
            .filter((place) => place.uploadNumber === upload.number)
            .map((place) => place.fileLine),
        ),
      ];
      if (lines.length === 0) continue;
      const rows = await Lot.sequelize!.query<{ file_line: number; serial: string }>(
        'SELECT file_line, serial FROM readings WHERE upload_number = :number AND file_line IN (:lines)',
        {
          replacements: { number: upload.number, lines },
          type: QueryTypes.SELECT,
          transaction: this.transaction,
        },
      );
      for (const row of rows) serials.set(`${upload.number}:${row.file_line}`, row.serial);
    }
    return serials;
  }
}

/** Puts serials where the analysis left places. */
function nameUnits(result: AnalysisResult, serials: Map<string, string>): void {
  const name = <T extends { serial: string }>(item: T) => {
    item.serial = serials.get(item.serial) ?? item.serial;
  };
  result.unitsBeyond.forEach(name);
  result.temperature?.curves.forEach(name);
  result.temperature?.activityDips.forEach(name);
  if (result.time) name(result.time);
}
