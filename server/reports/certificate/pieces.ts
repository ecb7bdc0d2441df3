import { type Ink, type Sheet } from './sheet';

/** A heading that stays with what follows it. */
export function heading(sheet: Sheet, text: string, keepWith = 40): void {
  sheet.need(30 + keepWith);
  sheet.space(12);
  sheet.paragraph(text, { size: 11.5, weight: 600 });
  sheet.space(2);
}

/** Names and values side by side; a missing value is left out. */
export function facts(sheet: Sheet, rows: readonly (readonly [string, string | null])[]): void {
  const nameWidth = 132;
  for (const [name, value] of rows) {
    if (value === null || value === '') continue;
    const valueStyle = { x: sheet.left + nameWidth, width: sheet.width - nameWidth };
    const height = sheet.heightOf(value, valueStyle);
    sheet.need(Math.min(height, 60));
    const top = sheet.y;
    sheet.line(name, top, { ink: 'soft' });
    sheet.paragraph(value, valueStyle);
    sheet.space(1.5);
  }
}

export interface Column {
  head: string;
  /** Share of the width. */
  share: number;
  align?: 'left' | 'right';
}

/** A table whose rows are never cut by a page; its head is repeated on the next one. */
export function table(sheet: Sheet, columns: readonly Column[], rows: readonly string[][]): void {
  const total = columns.reduce((sum, { share }) => sum + share, 0);
  const gap = 10;
  let at = sheet.left;
  const places = columns.map(({ share, align = 'left' }) => {
    const width = (sheet.width * share) / total;
    const place = { x: at, width: width - gap, align };
    at += width;
    return place;
  });
  const cells = (texts: readonly string[], ink: Ink, size: number) => {
    const top = sheet.y;
    let bottom = top;
    texts.forEach((text, index) => {
      const style = { ...places[index]!, ink, size };
      sheet.lines(text, style).forEach((line, n) => {
        sheet.line(line, top + n * size * 1.32, style);
        bottom = Math.max(bottom, top + (n + 1) * size * 1.32);
      });
    });
    sheet.y = bottom + 2;
  };
  const head = () => {
    cells(
      columns.map((column) => column.head),
      'soft',
      8.5,
    );
    sheet.rule();
    sheet.space(3);
  };
  head();
  for (const row of rows) {
    const height = Math.max(
      ...row.map((text, index) => sheet.heightOf(text, { ...places[index]!, size: 9.5 })),
    );
    const page = sheet.doc.bufferedPageRange().count;
    sheet.need(height + 4);
    if (sheet.doc.bufferedPageRange().count > page) head();
    cells(row, 'ink', 9.5);
  }
}
