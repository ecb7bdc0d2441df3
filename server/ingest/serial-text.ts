/**
 * A spreadsheet runs text that begins with one of these as a formula, so exports put an apostrophe before it
 * (see reports/csv.ts); reading takes exactly one such apostrophe away again.
 */
const marked = /^'+\s*[=+\-@]/;

export function withoutTextMark(serial: string): string {
  return marked.test(serial) ? serial.slice(1) : serial;
}
