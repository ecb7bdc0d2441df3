import { randomUUID } from 'node:crypto';
import { type IncomingMessage, type ServerResponse } from 'node:http';
import pino, { type Logger } from 'pino';
import { pinoHttp } from 'pino-http';
import { type Config } from '../config';

let shared: Logger | undefined;

/** One log for the process: JSON lines, never a cookie, a header, a body or a mailed link. */
export function log(config: Pick<Config, 'LOG_LEVEL'>): Logger {
  shared ??= pino({ level: config.LOG_LEVEL });
  shared.level = config.LOG_LEVEL;
  return shared;
}

/** Single-use links open doors: their tokens stay out of the log. */
export function withoutSecrets(url: string): string {
  return url.replace(/(\/links\/)[^/?#]+/g, '$1…').replace(/\?.*$/, '?…');
}

export function requestLog(config: Config) {
  return pinoHttp({
    logger: log(config),
    genReqId: () => randomUUID(),
    autoLogging: { ignore: (request) => !request.url?.startsWith('/api/') },
    serializers: {
      req: (request: IncomingMessage & { id: string }) => ({
        id: request.id,
        method: request.method,
        url: withoutSecrets(request.url ?? ''),
      }),
      res: (response: ServerResponse) => ({ statusCode: response.statusCode }),
    },
    wrapSerializers: false,
    customLogLevel: (_request, response, error) =>
      error || response.statusCode >= 500 ? 'error' : 'info',
  });
}
