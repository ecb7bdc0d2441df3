import { createHash } from 'node:crypto';
import { type Client, type PoolClient } from 'pg';
import { CopyWriter } from './copy-writer';
import { asUtf8, unpacked } from './decode';
import { countedUploads, rememberEarlier } from './earlier-readings';
import { FileRefused } from './errors';
import { checkHeader } from './header-check';
import { type Progress } from './progress';
import { createSuspectsTable, keepSuspects, proveDuplicates } from './prove-duplicates';
import { readingColumns } from './reading-columns';
import { RecordReader } from './record-reader';
import { writeRefusals } from './refused-writer';
import { type JudgeOptions, RowJudge } from './row-judge';
import { uploadBytes } from './upload-bytes';

export interface LoadOptions extends JudgeOptions {
  uploadId: string;
  lotId: string;
  greatestBytes: number;
}

export interface Loaded {
  judge: RowJudge;
  readingsSha256: string;
}

/** Refused rows wait for so many of their kind before they interrupt the COPY of readings. */
const REFUSALS_AT_ONCE = 2000;

/**
 * Reads an upload's bytes into `readings` and `refused_rows` over `client`, inside the caller's transaction. The bytes
 * come over `source`, another connection, so that reading and writing overlap.
 */
export async function loadFile(
  client: Client,
  source: PoolClient,
  options: LoadOptions,
  tell: { bytes(count: number): void; judge(judge: RowJudge): void; progress: Progress },
): Promise<Loaded> {
  const { mapping } = options;
  const hash = createHash('sha256');
  const writer = new CopyWriter(
    client,
    `COPY readings (${readingColumns(mapping).join(', ')}) FROM STDIN (FORMAT binary)`,
    (block) => hash.update(block),
  );
  const earlier = await countedUploads(client, options.lotId);
  const judge = new RowJudge(
    { ...options, gather: options.gather && earlier.length === 0 },
    writer,
  );
  tell.judge(judge);
  const series = mapping.shape === 'time_series';
  const conditions = { series, referenceTemperatureC: options.referenceTemperatureC };
  await rememberEarlier(client, earlier, judge.units, conditions);
  await createSuspectsTable(client);
  let suspected = 0;

  const empty = async () => {
    await writer.finish();
    await writeRefusals(client, options.uploadNumber, judge.refusals);
    await keepSuspects(client, judge.suspects);
    suspected += judge.suspects.length;
    judge.refusals = [];
    judge.suspects = [];
  };

  try {
    const reader = new RecordReader(
      mapping.delimiter.charCodeAt(0),
      mapping.headerRow ? checkHeader(judge, mapping) : judge,
    );
    const counted = countBytes(uploadBytes(source, options.uploadId), tell.bytes);
    for await (const chunk of asUtf8(unpacked(counted, options.greatestBytes), mapping.encoding)) {
      reader.push(chunk);
      tell.progress.check();
      await writer.flushed();
      if (judge.refusals.length >= REFUSALS_AT_ONCE) await empty();
    }
    reader.end();
    await empty();
    if (judge.rows === 0)
      throw new FileRefused(
        'file.no_rows',
        'The file holds no rows of readings. Check that it is the right file.',
      );
    if (suspected > 0)
      await proveDuplicates(client, [...earlier, options.uploadNumber], conditions);
    judge.units.release();
    return { judge, readingsSha256: hash.digest('hex') };
  } catch (error) {
    await writer.abort();
    throw error;
  }
}

async function* countBytes(
  source: AsyncIterable<Buffer>,
  tell: (count: number) => void,
): AsyncGenerator<Buffer> {
  for await (const chunk of source) {
    tell(chunk.length);
    yield chunk;
  }
}
