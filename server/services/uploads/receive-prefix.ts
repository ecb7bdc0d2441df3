import { type Request, type RequestHandler } from 'express';
import multer, { type StorageEngine } from 'multer';
import { type Readable } from 'node:stream';
import { config } from '../../config';
import { InvalidInput } from '../../http/errors';
import { limits } from '../../ingest/limits';

export interface ReceivedPrefix {
  fileName: string;
  prefix: Buffer;
}

const received = new WeakMap<Request, ReceivedPrefix>();

/** Keeps the first bytes of a file in memory and lets the rest pass by: looking at a file writes nothing. */
const firstBytes: StorageEngine = {
  _handleFile(request, file, done) {
    readPrefix(file.stream).then((prefix) => {
      received.set(request, { fileName: file.originalname, prefix });
      done(null, {});
    }, done);
  },
  _removeFile(_request, _file, done) {
    done(null);
  },
};

async function readPrefix(stream: Readable): Promise<Buffer> {
  const pieces: Buffer[] = [];
  let length = 0;
  for await (const piece of stream as AsyncIterable<Buffer>) {
    if (length < limits.prefixBytes) pieces.push(piece);
    length += piece.length;
  }
  return Buffer.concat(pieces).subarray(0, limits.prefixBytes);
}

export function receivePrefix(admit: (request: Request) => Promise<unknown>): RequestHandler {
  return (request, response, next) => {
    const upload = multer({
      storage: firstBytes,
      defParamCharset: 'utf8',
      limits: {
        files: 1,
        fields: 10,
        parts: 12,
        fieldNameSize: 100,
        fieldSize: 128 * 1024,
        fileSize: config().GREATEST_UPLOAD_BYTES,
      },
    }).single('file');
    admit(request).then(() => upload(request, response, next), next);
  };
}

export function receivedPrefix(request: Request): ReceivedPrefix {
  const found = received.get(request);
  if (!found)
    throw new InvalidInput(
      'Choose a file to look at.',
      { file: 'Choose a file.' },
      'upload.no_file',
    );
  if (found.prefix.length === 0)
    throw new InvalidInput('This file is empty.', { file: 'The file is empty.' }, 'upload.empty');
  return found;
}
