import { type ClientBase } from 'pg';
import { to as copyTo } from 'pg-copy-streams';
import { createInterface } from 'node:readline';
import { type Transaction } from 'sequelize';
import { UnitCollector, type MeasuredUnits, type UnitReading } from '@shared/analysis/units';
import { type PartCriteria } from '@shared/contract/parts';
import { makeOffsetPpm } from '@shared/radio/offset-reader';
import { offsetAtLoadPpm } from '@shared/resonator/load';
import { type Lot } from '../../models';

/** The connection that a Sequelize transaction runs on: COPY must see what the same transaction wrote. */
export function connectionOf(transaction: Transaction): ClientBase {
  return (transaction as unknown as { connection: ClientBase }).connection;
}

export interface LotReadings extends MeasuredUnits {
  /** Units of which no reading gives a resistance. */
  unitsLackingResistance: number;
}

/** Readings of a lot grouped by unit; a sub-lot holds the named units of its parent. */
function readingsSql(lot: Lot): string {
  const uploadsOf = lot.parentLotId ?? lot.id;
  const subLot = lot.parentLotId
    ? `AND r.serial IN (SELECT serial FROM sub_lot_units WHERE lot_id = '${lot.id}')`
    : '';
  return `COPY (
    SELECT r.serial, r.upload_number, r.file_line, r.frequency_hz, r.temperature_c, extract(epoch FROM r.measured_at) * 1000, r.resistance_ohm, r.load_capacitance_pf
    FROM readings r
    WHERE r.upload_number IN (SELECT number FROM uploads WHERE lot_id IN ('${uploadsOf}', '${lot.id}') AND state = 'done') ${subLot}
    ORDER BY r.serial, r.upload_number, r.file_line, r.file_column
  ) TO STDOUT`;
}

const orNull = (text: string) => (text === '\\N' ? null : Number(text));

/**
 * Reads a lot's readings from the database, unit by unit, never all at once. Readings taken at another load than the part's
 * are corrected by the part's motional and shunt capacitance where both are known.
 */
export async function readReadings(
  transaction: Transaction,
  lot: Lot,
  part: PartCriteria,
): Promise<LotReadings> {
  const collector = new UnitCollector(part.referenceTemperatureC, part.requiredTemperaturesC);
  const offsetOf = makeOffsetPpm(part.nominalFrequencyHz);
  const stream = connectionOf(transaction).query(copyTo(readingsSql(lot)));
  let serial: string | null = null;
  let unit: UnitReading[] = [];
  let unitsLackingResistance = 0;
  const take = () => {
    if (unit.length === 0) return;
    collector.addUnit(unit);
    if (unit.every(({ resistanceOhm }) => resistanceOhm === null)) unitsLackingResistance += 1;
  };
  for await (const line of createInterface({ input: stream, crlfDelay: Infinity })) {
    const [
      lineSerial,
      uploadNumber,
      fileLine,
      frequency,
      temperature,
      measuredAt,
      resistance,
      load,
    ] = line.split('\t') as [string, string, string, string, string, string, string, string];
    if (lineSerial !== serial) {
      take();
      serial = lineSerial;
      unit = [];
    }
    unit.push({
      offsetPpm: atPartsLoad(offsetOf.ofText(frequency), part, orNull(load)),
      temperatureC: orNull(temperature),
      measuredAtMs: orNull(measuredAt),
      resistanceOhm: orNull(resistance),
      fileLine: Number(fileLine),
      uploadNumber: Number(uploadNumber),
    });
  }
  take();
  return { ...collector.finish(), unitsLackingResistance };
}

function atPartsLoad(offsetPpm: number, part: PartCriteria, measuredLoadPf: number | null): number {
  const { loadCapacitancePf, motionalCapacitanceFf, shuntCapacitancePf } = part;
  if (measuredLoadPf === null || measuredLoadPf === loadCapacitancePf) return offsetPpm;
  if (loadCapacitancePf === null || motionalCapacitanceFf === null || shuntCapacitancePf === null)
    return offsetPpm;
  return offsetAtLoadPpm(
    offsetPpm,
    { motionalCapacitanceFf, shuntCapacitancePf },
    measuredLoadPf,
    loadCapacitancePf,
  );
}
