import { type UnitReading } from '@shared/analysis/units';

/** A reading at 25 °C without time or resistance; `changes` replace members. */
export const reading = (offsetPpm: number, changes: Partial<UnitReading> = {}): UnitReading => ({
  offsetPpm,
  temperatureC: 25,
  measuredAtMs: null,
  resistanceOhm: null,
  fileLine: 2,
  uploadNumber: 1,
  ...changes,
});
