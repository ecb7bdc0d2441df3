import { type Response } from 'express';
import Papa from 'papaparse';
import { QueryTypes } from 'sequelize';
import { database } from '../../database/connection';
import { decodeCursor, page } from '../../database/keyset';
import { reasonColumn } from '../../ingest/header-check';
import { asField } from '../../ingest/refusals';
import { type Upload } from '../../models';
import { csvTrailer, spreadsheetSafe, streamText } from '../../reports/csv';

interface RefusedRecord {
  file_line: number;
  column_name: string;
  text_found: string;
  rule: string;
  reason: string;
  raw_line: string;
}

const BATCH = 2000;

function queryRefused(uploadNumber: number, after: number, limit: number) {
  return database().sequelize.query<RefusedRecord>(
    `SELECT file_line, column_name, text_found, rule, reason, raw_line FROM refused_rows
     WHERE upload_number = :uploadNumber AND file_line > :after ORDER BY file_line LIMIT :limit`,
    { replacements: { uploadNumber, after, limit }, type: QueryTypes.SELECT },
  );
}

/** Refused rows of an upload in the order of the file. A withdrawn or running upload shows none of a half load: they are committed with it. */
export async function listRefusedRows(upload: Upload, query: { after?: string; limit: number }) {
  const after = query.after ? Number(decodeCursor(query.after, 1)[0]) : 0;
  const rows = await queryRefused(upload.number, after, query.limit + 1);
  return page(
    rows,
    query.limit,
    (row) => ({
      fileLine: row.file_line,
      column: row.column_name,
      text: row.text_found,
      rule: row.rule,
      reason: row.reason,
    }),
    (row) => [row.file_line],
  );
}

/**
 * The refused rows with their own columns and the reason, in the file's own delimiter and decimal sign, so that they can
 * be repaired and uploaded as they are. Always UTF-8 with a byte order mark, which outranks the encoding of the mapping.
 */
export async function writeRefusedCsv(upload: Upload, response: Response): Promise<void> {
  const delimiter = upload.mapping?.delimiter ?? ',';
  const columns = upload.mapping?.columns.length ?? 1;
  const safe = (field: string) => asField(spreadsheetSafe(field), delimiter);
  const headings = (upload.headings ?? []).slice(0, columns);
  const names =
    upload.mapping?.headerRow === false
      ? null
      : Array.from({ length: columns }, (_, index) => headings[index] ?? `column ${index + 1}`);
  async function* lines(): AsyncGenerator<string> {
    if (names) yield `\ufeff${[...names, reasonColumn].map(safe).join(delimiter)}\r\n`;
    else yield '\ufeff';
    let after = 0;
    let count = 0;
    for (;;) {
      const rows = await queryRefused(upload.number, after, BATCH);
      let text = '';
      for (const row of rows) {
        const fields =
          Papa.parse<string[]>(row.raw_line, { delimiter, newline: '\n' }).data[0] ?? [];
        // A row with too few or too many columns keeps them: only a person knows what is missing.
        if (names) while (fields.length < columns) fields.push('');
        const reason = names ? [`line ${row.file_line}: ${row.reason}`] : [];
        text += `${[...fields, ...reason].map(safe).join(delimiter)}\r\n`;
      }
      count += rows.length;
      if (text) yield text;
      if (rows.length < BATCH) break;
      after = rows.at(-1)!.file_line;
    }
    yield `${csvTrailer(count)}\r\n`;
  }
  await streamText(response, `refused-${upload.fileName.replace(/\.[^.]*$/, '')}.csv`, lines());
}
