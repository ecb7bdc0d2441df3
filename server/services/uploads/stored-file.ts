import { createHash } from 'node:crypto';
import { type Readable } from 'node:stream';
import { type Transaction } from 'sequelize';
import { connectionOf } from '../../database/connection';
import { CopyWriter } from '../../ingest/copy-writer';
import { limits } from '../../ingest/limits';
import { putInt16, putInt32 } from '../../ingest/put-bytes';

/** One row of `upload_chunks`. */
const PART_BYTES = 1024 * 1024;

export interface StoredFile {
  byteCount: number;
  sha256: string;
  /** The first bytes, to find out what the file is. */
  prefix: Buffer;
}

/**
 * Writes a file into `upload_chunks` while it arrives, in the caller's transaction: hash, count and bytes in one pass,
 * never more than a part of it in memory, and nothing on disk outside the database.
 */
export async function storeFile(
  transaction: Transaction,
  uploadId: string,
  file: Readable,
): Promise<StoredFile> {
  const hash = createHash('sha256');
  const prefix: Buffer[] = [];
  let prefixBytes = 0;
  let byteCount = 0;
  let part = 0;
  const writer = new CopyWriter(
    connectionOf(transaction),
    'COPY upload_chunks (upload_id, part, bytes) FROM STDIN (FORMAT binary)',
  );
  const id = Buffer.from(uploadId.replaceAll('-', ''), 'hex');
  let pieces: Buffer[] = [];
  let gathered = 0;
  const writePart = async () => {
    if (gathered === 0) return;
    writer.need(64 + gathered);
    const { buffer } = writer;
    let at = putInt16(buffer, writer.at, 3);
    at = putInt32(buffer, at, 16);
    at += id.copy(buffer, at);
    at = putInt32(buffer, at, 4);
    at = putInt32(buffer, at, part);
    at = putInt32(buffer, at, gathered);
    for (const piece of pieces) at += piece.copy(buffer, at);
    writer.at = at;
    part += 1;
    pieces = [];
    gathered = 0;
    await writer.flushed();
  };
  try {
    for await (const chunk of file as AsyncIterable<Buffer>) {
      hash.update(chunk);
      byteCount += chunk.length;
      if (prefixBytes < limits.prefixBytes) {
        prefix.push(chunk.subarray(0, limits.prefixBytes - prefixBytes));
        prefixBytes += prefix.at(-1)!.length;
      }
      pieces.push(chunk);
      gathered += chunk.length;
      if (gathered >= PART_BYTES) await writePart();
    }
    await writePart();
    await writer.finish();
  } catch (error) {
    await writer.abort();
    throw error;
  }
  return { byteCount, sha256: hash.digest('hex'), prefix: Buffer.concat(prefix) };
}
