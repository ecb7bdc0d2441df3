import { type Client } from 'pg';
import { type Refusal } from './refusals';
import { CopyWriter } from './copy-writer';
import { putInt16, putInt32 } from './put-bytes';

/** Sends refused rows by binary COPY of their own. */
export async function writeRefusals(
  client: Client,
  uploadNumber: number,
  refusals: Refusal[],
): Promise<void> {
  const writer = new CopyWriter(
    client,
    `COPY refused_rows (upload_number, file_line, column_name, text_found, rule, reason, raw_line) FROM STDIN (FORMAT binary)`,
  );
  for (const { fileLine, column, text, rule, reason, rawLine } of refusals) {
    const texts = [column, text, rule, reason, rawLine];
    writer.need(30 + 3 * texts.reduce((sum, item) => sum + item.length + 4, 0));
    let at = putInt16(writer.buffer, writer.at, 7);
    for (const value of [uploadNumber, fileLine]) {
      at = putInt32(writer.buffer, at, 4);
      at = putInt32(writer.buffer, at, value);
    }
    for (const item of texts) {
      const length = writer.buffer.write(item, at + 4, 'utf8');
      at = putInt32(writer.buffer, at, length) + length;
    }
    writer.at = at;
    await writer.flushed();
  }
  await writer.finish();
}
