import { type BenchRow } from './bench-row';

/** Median of each row, its spread, and its ratio to the first row's median. */
export function ratioTable(rows: readonly BenchRow[]): string {
  const first = rows[0] ? median(rows[0].runsMs) : NaN;
  const cells = rows.map((row) => {
    const middle = median(row.runsMs);
    const rate = row.items
      ? `${Math.round((row.items.count / middle) * 1000).toLocaleString('en')} ${row.items.unit}/s`
      : '';
    return [
      row.name,
      `${middle.toFixed(2)} ms`,
      `${Math.min(...row.runsMs).toFixed(2)} to ${Math.max(...row.runsMs).toFixed(2)}`,
      (middle / first).toFixed(2),
      rate,
    ];
  });
  const table = [['way', 'median', 'least to most', 'ratio', 'rate'], ...cells];
  const widths = table[0]!.map((_, column) => Math.max(...table.map((row) => row[column]!.length)));
  return table
    .map((row) =>
      row
        .map((cell, column) =>
          column === 0 ? cell.padEnd(widths[column]!) : cell.padStart(widths[column]!),
        )
        .join('  ')
        .trimEnd(),
    )
    .join('\n');
}

function median(values: readonly number[]): number {
  const sorted = [...values].sort((a, b) => a - b);
  const half = sorted.length >> 1;
  return sorted.length % 2 ? sorted[half]! : (sorted[half - 1]! + sorted[half]!) / 2;
}
