import { randomUUID } from 'node:crypto';
import { type Request, type RequestHandler, type Response } from 'express';
import multer, { type StorageEngine } from 'multer';
import { type Transaction } from 'sequelize';
import { config } from '../../config';
import { longTransaction } from '../../database/connection';
import { type Actor } from '../../http/actor';
import { InvalidInput, TooLarge } from '../../http/errors';
import { type Lot, Upload } from '../../models';
import { type StoredFile, storeFile } from './stored-file';

/** A file that has arrived and lies in an open transaction, until the act that uses it commits. */
export interface ReceivedFile extends StoredFile {
  transaction: Transaction;
  uploadId: string;
  fileName: string;
}

const received = new WeakMap<Request, ReceivedFile>();

export function receivedFile(request: Request): ReceivedFile {
  const file = received.get(request);
  if (!file)
    throw new InvalidInput(
      'Choose a file to upload.',
      { file: 'Choose a file.' },
      'upload.no_file',
    );
  if (file.byteCount === 0)
    throw new InvalidInput('This file is empty.', { file: 'The file is empty.' }, 'upload.empty');
  return file;
}

export interface Admission {
  lot: Lot;
  actor: Actor;
  benchTokenId: string | null;
}

/**
 * Reads one multipart file straight into the database. `admit` runs before a byte is read: it finds the lot and asks
 * whether this actor may upload to it. Until the act commits, everything lies in one transaction, which is undone when the
 * answer goes out without it or the sender goes away.
 */
export function receiveFile(
  admit: (request: Request, response: Response) => Promise<Admission>,
): RequestHandler {
  return (request, response, next) => {
    void (async () => {
      const admission = await admit(request, response);
      response.locals.admission = admission;
      refuseTooLarge(request);
      await parse(request, response, admission);
    })().then(() => next(), next);
  };
}

export function admissionOf(response: Response): Admission {
  return response.locals.admission as Admission;
}

function refuseTooLarge(request: Request): void {
  const announced = Number(request.headers['content-length'] ?? 0);
  // The multipart frame and the fields around the file weigh something too.
  if (announced > config().GREATEST_UPLOAD_BYTES + 256 * 1024) throw tooLarge();
}

function tooLarge(): TooLarge {
  const mebibytes = Math.round(config().GREATEST_UPLOAD_BYTES / 1024 / 1024);
  return new TooLarge(
    `This file is larger than the ${mebibytes} MiB that are taken at once. Compress it with gzip, or split it.`,
  );
}

function parse(request: Request, response: Response, admission: Admission): Promise<void> {
  const upload = multer({
    storage: intoDatabase(request, response, admission),
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
  return new Promise((resolve, reject) => {
    void upload(request, response, (error: unknown) => {
      if (error instanceof multer.MulterError && error.code === 'LIMIT_FILE_SIZE')
        reject(tooLarge());
      else if (error) reject(error instanceof Error ? error : new Error('The upload broke off.'));
      else resolve();
    });
  });
}

function intoDatabase(request: Request, response: Response, admission: Admission): StorageEngine {
  return {
    _handleFile(_request, file, done) {
      store(request, response, admission, file).then(() => done(null, {}), done);
    },
    // Nothing lies anywhere but in the transaction, which the closed response undoes.
    _removeFile(_request, _file, done) {
      done(null);
    },
  };
}

async function store(
  request: Request,
  response: Response,
  { lot, actor, benchTokenId }: Admission,
  file: Express.Multer.File,
): Promise<void> {
  const transaction = await longTransaction();
  let storing: Promise<unknown> = Promise.resolve();
  const undo = () => {
    file.stream.destroy();
    // The connection speaks COPY until the storing has noticed; only then can it be told to roll back.
    void storing
      .catch(() => undefined)
      .then(() => (isOpen(transaction) ? transaction.rollback() : undefined))
      .catch(() => undefined);
  };
  if (response.closed || request.socket.destroyed) {
    await transaction.rollback();
    throw new Error('The sender went away.');
  }
  response.once('close', undo);
  storing = (async () => {
    const upload = await Upload.create(
      {
        id: randomUUID(),
        lotId: lot.id,
        fileName: safeFileName(file.originalname),
        uploadedBy: actor.kind === 'person' ? actor.id : null,
        benchTokenId,
      },
      { transaction },
    );
    const stored = await storeFile(transaction, upload.id, file.stream);
    received.set(request, {
      ...stored,
      transaction,
      uploadId: upload.id,
      fileName: upload.fileName,
    });
  })();
  await storing;
}

function isOpen(transaction: Transaction): boolean {
  return (transaction as unknown as { finished?: string }).finished === undefined;
}

/** A name to show, never a path: the last part, without control characters, of bearable length. */
export function safeFileName(name: string): string {
  const last = name.split(/[\\/]/).at(-1) ?? '';

  const clean = last.replace(/[\p{Cc}\p{Bidi_Control}]/gu, '').trim();
  return clean.slice(0, 200) || 'file.csv';
}
