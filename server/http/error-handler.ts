import { type ErrorRequestHandler, type Response } from 'express';
import { MulterError } from 'multer';
import {
  ConnectionError,
  DatabaseError,
  UniqueConstraintError,
  ForeignKeyConstraintError,
} from 'sequelize';
import {
  ActionError,
  Conflict,
  InvalidInput,
  NotFound,
  NotReady,
  TooLarge,
  TooMany,
} from './errors';

/** PostgreSQL's and the network's ways of saying that the database is not there now. */
const notThere = new Set([
  '57P01', // admin_shutdown
  '57P02', // crash_shutdown
  '57P03', // cannot_connect_now
  '53300', // too_many_connections
  '3D000', // invalid_catalog_name: the server is there, our database is not
  '08000',
  '08003',
  '08006',
  'ECONNREFUSED',
  'ECONNRESET',
  'ENOTFOUND',
  'EPIPE',
  'ETIMEDOUT',
]);

function isDatabaseGone(error: unknown): boolean {
  if (error instanceof ConnectionError) return true;
  const inner = error instanceof DatabaseError ? error.parent : error;
  if (!(inner instanceof Error)) return false;
  const code = 'code' in inner ? String(inner.code) : '';
  return (
    notThere.has(code) ||
    /Connection terminated|timeout exceeded when trying to connect|Client has encountered a connection error/.test(
      inner.message,
    )
  );
}

function fromMulter(error: MulterError): ActionError {
  if (error.code === 'LIMIT_FILE_SIZE')
    return new TooLarge(
      'This file is larger than is taken here. Split it, or compress it with gzip.',
    );
  if (error.code === 'LIMIT_UNEXPECTED_FILE')
    return new InvalidInput(
      'A file came under a name that is not expected here.',
      { [error.field ?? 'file']: 'No file is expected under this name.' },
      'upload.unexpected_file',
    );
  return new InvalidInput(
    'The upload holds too many parts, or parts that are too long.',
    undefined,
    'upload.malformed',
  );
}

/** Errors of Express and body parsers carry a status and a type. */
function fromParser(error: { status: number; type?: string }): ActionError {
  if (error.type === 'entity.too.large')
    return new TooLarge('This request is larger than is taken here.', 'request.too_large');
  if (error.type === 'entity.parse.failed')
    return new InvalidInput('The body is not readable JSON.', undefined, 'request.not_json');
  return new ActionError(error.status, 'request.malformed', 'This request cannot be read.');
}

/** What a thrown thing means to the one who asked; undefined: it is our own fault. */
export function actionErrorFrom(error: unknown): ActionError | undefined {
  if (error instanceof ActionError) return error;
  if (error instanceof MulterError) return fromMulter(error);
  if (error instanceof UniqueConstraintError)
    return new Conflict('record.exists', 'A record with these values exists already.');
  if (error instanceof ForeignKeyConstraintError) return new NotFound('Something named here');
  if (isDatabaseGone(error)) return new NotReady();
  if (error instanceof Error && error.message === 'Unexpected end of form')
    return new InvalidInput('The upload ended in the middle.', undefined, 'upload.cut_short');
  if (
    error instanceof Error &&
    'status' in error &&
    typeof error.status === 'number' &&
    error.status >= 400 &&
    error.status < 500
  )
    return fromParser(error as Error & { status: number; type?: string });
  return undefined;
}

export function answerError(response: Response, error: ActionError): void {
  if (error instanceof TooMany) response.set('Retry-After', String(error.retryAfterSeconds));
  const { code, message, fields } = error;
  response.status(error.status).json({ error: { code, message, ...(fields ? { fields } : {}) } });
}

/** The one place where errors become answers. What we did not expect is logged under an id and told only by that id. */
export const errorHandler: ErrorRequestHandler = (error: unknown, request, response, _next) => {
  const known = actionErrorFrom(error);
  if (!known || known.status >= 500) request.log?.error({ err: error }, 'request failed');
  if (response.headersSent) {
    // The answer has begun and cannot be taken back; a cut connection is the only honest sign left.
    response.destroy();
    return;
  }
  const told =
    known ??
    new ActionError(
      500,
      'server.unexpected',
      `Something went wrong here. It is logged as ${String(request.id)}; nothing was changed.`,
    );
  response.set('Cache-Control', 'no-store');
  answerError(response, told);
};
