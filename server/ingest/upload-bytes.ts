import { type PoolClient } from 'pg';
import { to as copyTo } from 'pg-copy-streams';

/** Signature, flags and length of the header extension of binary COPY. */
const HEADER_BYTES = 19;

/**
 * The stored bytes of an upload, in order, read back by binary COPY: no hexadecimal detour, and no more in memory than
 * the connection holds. The client is the caller's; it can be used again when the generator has ended.
 */
export async function* uploadBytes(client: PoolClient, uploadId: string): AsyncGenerator<Buffer> {
  if (!/^[0-9a-f-]{36}$/.test(uploadId)) throw new TypeError('Not an upload id.');
  const stream = client.query(
    copyTo(
      `COPY (SELECT bytes FROM upload_chunks WHERE upload_id = '${uploadId}' ORDER BY part) TO STDOUT (FORMAT binary)`,
    ),
  );
  let toSkip = HEADER_BYTES;
  let heldBack: Buffer = Buffer.alloc(0);
  let left = 0;
  for await (const piece of stream as AsyncIterable<Buffer>) {
    let bytes = heldBack.length ? Buffer.concat([heldBack, piece]) : piece;
    heldBack = Buffer.alloc(0);
    while (bytes.length) {
      if (toSkip > 0) {
        const skipped = Math.min(toSkip, bytes.length);
        toSkip -= skipped;
        bytes = bytes.subarray(skipped);
      } else if (left > 0) {
        const part = bytes.subarray(0, left);
        left -= part.length;
        bytes = bytes.subarray(part.length);
        yield part;
      } else if (bytes.length >= 2 && bytes.readInt16BE(0) === -1) {
        bytes = bytes.subarray(2);
      } else if (bytes.length < 6) {
        heldBack = bytes;
        break;
      } else {
        left = bytes.readInt32BE(2);
        bytes = bytes.subarray(6);
      }
    }
  }
}
