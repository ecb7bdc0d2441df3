import { type Response } from 'express';
import { pipeline } from 'node:stream/promises';
import { Readable } from 'node:stream';
import { database } from '../../database/connection';
import { uploadBytes } from '../../ingest/upload-bytes';
import { type Upload } from '../../models';

/** The file as it came, byte for byte, as something to keep and never to show. */
export async function downloadOriginal(upload: Upload, response: Response): Promise<void> {
  response
    .status(200)
    .type('application/octet-stream')
    .set({
      'Content-Length': upload.byteCount,
      'X-Content-Type-Options': 'nosniff',
      'Content-Security-Policy': "sandbox; default-src 'none'",
    })
    .attachment(upload.fileName);
  response.type('application/octet-stream');
  const client = await database().pool.connect();
  let failure: Error | undefined;
  try {
    await pipeline(Readable.from(uploadBytes(client, upload.id), { objectMode: false }), response);
  } catch (error) {
    failure = error as Error;
    // A reader who left is no error of ours; a cut answer cannot be mended.
    if (!response.destroyed) response.destroy();
  } finally {
    // After a cut the connection may still speak COPY: it is not given back.
    client.release(failure);
  }
}
