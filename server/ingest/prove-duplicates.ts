import { type Client } from 'pg';
import { type Suspect } from './row-judge';

/** Keys collided although the rows differ: load once more, with another seed. One in some ten million loads of five million rows. */
export class FalseSuspicion extends Error {}

export const suspectsTable = 'suspected_duplicates';

export async function createSuspectsTable(client: Client): Promise<void> {
  await client.query(
    `CREATE TEMPORARY TABLE ${suspectsTable} (serial text COLLATE "C", temperature_c numeric, measured_micros bigint) ON COMMIT DROP`,
  );
}

export async function keepSuspects(client: Client, suspects: Suspect[]): Promise<void> {
  if (suspects.length === 0) return;
  await client.query(
    `INSERT INTO ${suspectsTable} SELECT * FROM unnest($1::text[], $2::numeric[], $3::bigint[])`,
    [
      suspects.map((suspect) => suspect.serial),
      suspects.map((suspect) => suspect.temperature),
      suspects.map((suspect) => suspect.measuredAt),
    ],
  );
}

/** Every row that was refused as a repetition must have a twin among the readings, to the letter. */
export async function proveDuplicates(
  client: Client,
  uploadNumbers: number[],
  options: { series: boolean; referenceTemperatureC: number },
): Promise<void> {
  const twin = options.series
    ? `coalesce((extract(epoch FROM r.measured_at) * 1000000)::bigint - 946684800000000, 0) = coalesce(s.measured_micros, 0)`
    : `coalesce(r.temperature_c, ${options.referenceTemperatureC}) = coalesce(s.temperature_c, ${options.referenceTemperatureC})`;
  const { rows } = await client.query(
    `SELECT 1 FROM ${suspectsTable} s WHERE NOT EXISTS (
       SELECT FROM readings r WHERE r.serial = s.serial AND ${twin}
         AND r.upload_number IN (${uploadNumbers.map(Number).join(',')})) LIMIT 1`,
  );
  if (rows.length) throw new FalseSuspicion();
}
