import { once } from 'node:events';
import { type Response } from 'express';

export interface CsvColumn<Row> {
  header: string;
  /** Numbers go out untouched; text that a spreadsheet would run as a formula is neutralised. */
  kind: 'number' | 'text';
  value: (row: Row) => string | number | null;
}

const strictNumber = /^[+-]?(\d+(\.\d*)?|\.\d+)([eE][+-]?\d+)?$/;
// Apostrophes in front count too, so that reading a file of ours can take exactly one away again.
const formula = /^'*\s*[=+\-@\t\r\n]/;

/** One field. A text that a spreadsheet could run gets an apostrophe in front; a number never does. */
export function csvField(value: string | number | null, kind: 'number' | 'text'): string {
  if (value === null) return '';
  const text = String(value);
  const safe =
    kind === 'number' && strictNumber.test(text) ? text : formula.test(text) ? `'${text}` : text;
  return /[",\r\n]/.test(safe) || safe !== safe.trim() ? `"${safe.replaceAll('"', '""')}"` : safe;
}

/** Text of a column that may hold both: what is a number stays, what a spreadsheet would run is neutralised. */
export function spreadsheetSafe(text: string): string {
  return !strictNumber.test(text) && formula.test(text) ? `'${text}` : text;
}

/** Last line of every export: whoever reads the file can tell that none of it is missing. */
export function csvTrailer(count: number): string {
  return `# end of export: ${count} rows`;
}

/** Streams rows batch by batch, as fast as the reader takes them; the last line says how many there are. */
export async function writeCsv<Row>(
  response: Response,
  fileName: string,
  columns: CsvColumn<Row>[],
  batches: AsyncIterable<Row[]>,
): Promise<void> {
  response.status(200).type('text/csv; charset=utf-8').attachment(fileName);
  let count = 0;
  response.write(`${columns.map((column) => csvField(column.header, 'text')).join(',')}\r\n`);
  for await (const rows of batches) {
    count += rows.length;
    const text = rows
      .map((row) => `${columns.map(({ value, kind }) => csvField(value(row), kind)).join(',')}\r\n`)
      .join('');
    if (!response.write(text))
      await Promise.race([once(response, 'drain'), once(response, 'close')]);
    if (response.destroyed) return;
  }
  response.end(`${csvTrailer(count)}\r\n`);
}

/** Streams text that is CSV already, as fast as the reader takes it. */
export async function streamText(
  response: Response,
  fileName: string,
  pieces: AsyncIterable<string>,
): Promise<void> {
  response.status(200).type('text/csv; charset=utf-8').attachment(fileName);
  for await (const text of pieces) {
    if (!response.write(text))
      await Promise.race([once(response, 'drain'), once(response, 'close')]);
    if (response.destroyed) return;
  }
  response.end();
}
