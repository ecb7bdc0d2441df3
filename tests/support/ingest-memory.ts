import { Mapping } from '../../shared/contract/uploads';
import { asUtf8, unpacked } from '../../server/ingest/decode';
import { FileRefused } from '../../server/ingest/errors';
import { checkHeader } from '../../server/ingest/header-check';
import { plainMapping } from '../../server/ingest/propose/propose-mapping';
import { RecordReader } from '../../server/ingest/record-reader';
import { RowJudge } from '../../server/ingest/row-judge';

/** What a file came to: the binary rows that would be sent, their serials, the refusals; or the failure of the whole. */
export interface Outcome {
  rows: string;
  serials: string[];
  refused: string[];
  counts: [rows: number, taken: number, refused: number];
  fails: string | null;
}

/** Reads a file as the worker does, without a database. */
export async function ingest(
  chunks: Iterable<Buffer>,
  given?: object,
  criteria: { nominalHz?: string } = {},
): Promise<Outcome> {
  const mapping = given ? Mapping.parse(given) : plainMapping();
  const blocks: Buffer[] = [];
  const writer = {
    buffer: Buffer.alloc(64 * 1024),
    at: 0,
    need(bytes: number) {
      if (this.at + bytes <= this.buffer.length) return;
      blocks.push(Buffer.from(this.buffer.subarray(0, this.at)));
      this.at = 0;
    },
  };
  const judge = new RowJudge(
    {
      mapping,
      uploadNumber: 1,
      nominalHz: criteria.nominalHz ?? '16000000',
      referenceTemperatureC: 25,
      requiredTemperaturesC: [],
      repeatReadings: 'refuse',
      gather: true,
      chamber: { lowC: null, highC: null },
    },
    writer as never,
  );
  let fails: string | null = null;
  try {
    const reader = new RecordReader(
      mapping.delimiter.charCodeAt(0),
      mapping.headerRow ? checkHeader(judge, mapping) : judge,
    );
    for await (const text of asUtf8(unpacked(flow(chunks), 8 * 1024 * 1024), mapping.encoding))
      reader.push(text);
    reader.end();
    if (judge.rows === 0) throw new FileRefused('file.no_rows', '');
  } catch (error) {
    if (!(error instanceof FileRefused)) throw error;
    fails = error.code;
  }
  blocks.push(Buffer.from(writer.buffer.subarray(0, writer.at)));
  const all = Buffer.concat(blocks);
  return {
    rows: all.toString('latin1'),
    serials: serialsOf(all, mapping.columns.filter((c) => c.target === 'frequency').length > 1),
    refused: judge.refusals.map((refusal) => `${refusal.fileLine}:${refusal.rule}`),
    counts: [judge.rows, judge.taken, judge.refusedCount],
    fails,
  };
}

async function* flow(chunks: Iterable<Buffer>): AsyncGenerator<Buffer> {
  yield* chunks;
}

/** Reads the binary COPY rows back. */
function serialsOf(rows: Buffer, withColumn: boolean): string[] {
  const serials: string[] = [];
  let at = 0;
  while (at < rows.length) {
    const fields = rows.readInt16BE(at);
    at += 2;
    for (let field = 0; field < fields; field += 1) {
      const length = rows.readInt32BE(at);
      at += 4;
      if (field === (withColumn ? 3 : 2)) serials.push(rows.toString('utf8', at, at + length));
      at += Math.max(0, length);
    }
  }
  return serials;
}

export function cutInto(bytes: Buffer, size: number): Buffer[] {
  const pieces: Buffer[] = [];
  for (let at = 0; at < bytes.length; at += size) pieces.push(bytes.subarray(at, at + size));
  return pieces;
}
