import { type Request, type RequestHandler } from 'express';
import multer, { MulterError } from 'multer';
import { InvalidInput, TooLarge } from '../../http/errors';
import { greatestFileBytes, greatestFileCount, type EvidenceFile } from './keep-evidence';

const receive = multer({
  storage: multer.memoryStorage(),
  defParamCharset: 'utf8',
  limits: {
    files: greatestFileCount,
    fileSize: greatestFileBytes,
    fields: 10,
    fieldSize: 64 * 1024,
    parts: greatestFileCount + 10,
  },
}).array('files', greatestFileCount);

/** Reads files and text of a multipart answer; a JSON body passes by untouched. */
export const evidenceParser: RequestHandler = (request, response, next) => {
  void receive(request, response, (error: unknown) => next(error && sentence(error)));
};

function sentence(error: unknown): unknown {
  if (!(error instanceof MulterError)) return error;
  const megabytes = greatestFileBytes / 1024 / 1024;
  if (error.code === 'LIMIT_FILE_SIZE')
    return new TooLarge(
      `A file may have at most ${megabytes} MB. Send a smaller one.`,
      'attachment.too_large',
    );
  if (
    error.code === 'LIMIT_FILE_COUNT' ||
    (error.code === 'LIMIT_UNEXPECTED_FILE' && error.field === 'files')
  )
    return new InvalidInput(
      `Send at most ${greatestFileCount} files at a time.`,
      { files: `At most ${greatestFileCount} files.` },
      'attachment.too_many',
    );
  return error;
}

export function evidenceOf(request: Request): EvidenceFile[] {
  const files = Array.isArray(request.files) ? request.files : [];
  return files.map(({ originalname, buffer }) => ({ fileName: originalname, bytes: buffer }));
}
