/** One cell of a CSV file. Numbers go as they are; text that a spreadsheet would take for a formula gets a quote before it. */
export function csvCell(value: string | number | null): string {
  if (value === null) return '';
  const text = String(value);
  if (/^[+-]?\d+(\.\d+)?([eE][+-]?\d+)?$/.test(text)) return text;
  const safe = /^[\s\ufeff]*[=+\-@\t\r\n]/.test(text) ? `'${text}` : text;
  return /[",\r\n]/.test(safe) ? `"${safe.replaceAll('"', '""')}"` : safe;
}

export function csvText(
  columns: readonly string[],
  rows: readonly (readonly (string | number | null)[])[],
): string {
  return [columns, ...rows].map((row) => row.map(csvCell).join(',')).join('\r\n') + '\r\n';
}

export function saveCsv(fileName: string, text: string): void {
  // The mark at the start tells spreadsheets that this is UTF-8.
  const url = URL.createObjectURL(new Blob(['\ufeff', text], { type: 'text/csv;charset=utf-8' }));
  saveUrl(`${fileName}.csv`, url);
  URL.revokeObjectURL(url);
}

export function saveUrl(fileName: string, url: string): void {
  const link = document.createElement('a');
  link.href = url;
  link.download = fileName;
  link.click();
}
