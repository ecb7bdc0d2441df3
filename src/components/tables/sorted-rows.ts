import { type TableColumn, type TableSort } from './table-types';

const collator = new Intl.Collator(undefined, { numeric: true, sensitivity: 'base' });

/** Rows in the order asked for; what has no value comes last either way, and equal rows keep their place. */
export function sortedRows<Row>(
  rows: readonly Row[],
  columns: readonly TableColumn<Row>[],
  sort: TableSort | null,
): readonly Row[] {
  const value = columns.find(({ key }) => key === sort?.key)?.value;
  if (!sort || !value) return rows;
  const sign = sort.direction === 'ascending' ? 1 : -1;
  return [...rows].sort((one, other) => {
    const a = value(one);
    const b = value(other);
    if (a === null || b === null) return (a === null ? 1 : 0) - (b === null ? 1 : 0);
    if (typeof a === 'number' && typeof b === 'number') return sign * (a - b);
    return sign * collator.compare(String(a), String(b));
  });
}
