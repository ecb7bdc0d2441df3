import { type Mapping } from '@shared/contract/uploads';

/** A column of `readings` beyond those every row has. */
export type ReadingColumn =
  | 'file_column'
  | 'temperature_c'
  | 'measured_at'
  | 'resistance_ohm'
  | 'load_capacitance_pf'
  | 'supply_v'
  | 'drive_uw';

const extraColumns = {
  resistance: 'resistance_ohm',
  loadCapacitance: 'load_capacitance_pf',
  supplyVoltage: 'supply_v',
  driveLevel: 'drive_uw',
} as const;

/** Which field of a record goes where. */
export interface FieldPlan {
  serial: number;
  frequencies: { field: number; unit: Frequency['unit']; temperatureC: number | null }[];
  temperature: number;
  measuredAt: number;
  elapsedSeconds: number;
  extras: { field: number; column: (typeof extraColumns)[keyof typeof extraColumns] }[];
}
type Frequency = Extract<Mapping['columns'][number], { target: 'frequency' }>;

export function planFields(mapping: Mapping): FieldPlan {
  const of = (target: string) => mapping.columns.findIndex((column) => column.target === target);
  return {
    serial: of('serial'),
    frequencies: mapping.columns.flatMap((column, field) =>
      column.target === 'frequency'
        ? [{ field, unit: column.unit, temperatureC: column.temperatureC }]
        : [],
    ),
    temperature: of('temperature'),
    measuredAt: of('measuredAt'),
    elapsedSeconds: of('elapsedSeconds'),
    extras: mapping.columns.flatMap((column, field) =>
      column.target in extraColumns
        ? [{ field, column: extraColumns[column.target as keyof typeof extraColumns] }]
        : [],
    ),
  };
}

/**
 * The columns of `readings` that files of this mapping fill, in the order they are sent. The upload's readings hash is
 * SHA-256 over the binary COPY rows of exactly these columns in file order, so that it can be made again from the table.
 */
export function readingColumns(mapping: Mapping): string[] {
  const plan = planFields(mapping);
  return [
    'upload_number',
    'file_line',
    ...(plan.frequencies.length > 1 ? ['file_column'] : []),
    'serial',
    ...(plan.temperature >= 0 || hasFixedTemperature(mapping, plan) ? ['temperature_c'] : []),
    'frequency_hz',
    ...(plan.measuredAt >= 0 || plan.elapsedSeconds >= 0 ? ['measured_at'] : []),
    ...plan.extras.map((extra) => extra.column),
  ];
}

export function hasFixedTemperature(mapping: Mapping, plan: FieldPlan): boolean {
  return (
    mapping.temperatureC !== null || plan.frequencies.some((column) => column.temperatureC !== null)
  );
}
