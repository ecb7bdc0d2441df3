import { type Client } from 'pg';
import { to as copyTo } from 'pg-copy-streams';
import { type UnitTable, hashBytes, hashWhole } from './unit-table';

const TAB = 9;
const LF = 10;

/** Upload numbers of a lot whose readings count now. */
export async function countedUploads(client: Client, lotId: string): Promise<number[]> {
  const { rows } = await client.query<{ number: number }>(
    `SELECT number FROM uploads WHERE lot_id = $1 AND state = 'done' AND rows_taken > 0 ORDER BY number`,
    [lotId],
  );
  return rows.map((row) => row.number);
}

/** Makes a table know the units, and their conditions, that the lot's earlier uploads hold. */
export async function rememberEarlier(
  client: Client,
  numbers: number[],
  table: UnitTable,
  options: { series: boolean; referenceTemperatureC: number },
): Promise<void> {
  if (numbers.length === 0) return;
  const condition = options.series
    ? `coalesce((extract(epoch FROM measured_at) * 1000000)::bigint - 946684800000000, 0)`
    : `trim_scale(coalesce(temperature_c, ${options.referenceTemperatureC}))`;
  const stream = client.query(
    copyTo(
      `COPY (SELECT serial, ${condition} FROM readings WHERE upload_number IN (${numbers.map(Number).join(',')})) TO STDOUT`,
    ),
  );
  let rest: Buffer = Buffer.alloc(0);
  for await (const piece of stream as AsyncIterable<Buffer>) {
    const bytes = rest.length ? Buffer.concat([rest, piece]) : piece;
    let start = 0;
    for (let end = bytes.indexOf(LF); end !== -1; end = bytes.indexOf(LF, start)) {
      const tab = bytes.lastIndexOf(TAB, end);
      const hash = options.series
        ? hashWhole(Number(bytes.toString('latin1', tab + 1, end)))
        : hashBytes(bytes, tab + 1, end);
      const serial = unescaped(bytes.subarray(start, tab));
      table.see(serial, 0, serial.length, hash, true);
      start = end + 1;
    }
    rest = Buffer.from(bytes.subarray(start));
  }
}

/** COPY's text form escapes the backslash; control characters cannot occur in a serial. */
function unescaped(serial: Buffer): Buffer {
  return serial.includes(92)
    ? Buffer.from(serial.toString('utf8').replaceAll('\\\\', '\\'), 'utf8')
    : serial;
}
