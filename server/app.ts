import express, { type Express } from 'express';
import { config } from './config';
import { NotFound } from './http/errors';
import { clientFiles } from './http/client-files';
import { errorHandler } from './http/error-handler';
import { mount } from './http/mount';
import { originCheck } from './http/origin-check';
import { requestLog } from './http/request-log';
import { securityHeaders } from './http/security-headers';
import { useSessions } from './http/sessions';
import { apiDocs } from './http/api-docs';
import { routes } from './routes';

/** Assembles the application. `useConfig` and `openDatabase` come first. */
export function createApp(): Express {
  const settings = config();
  const app = express();
  app.disable('x-powered-by');
  app.disable('etag');
  if (settings.TRUST_PROXY) {
    app.set(
      'trust proxy',
      settings.TRUST_PROXY.split(',').map((proxy) => proxy.trim()),
    );
  }
  app.use(requestLog(settings), securityHeaders(settings));
  app.use('/api', (_request, response, next) => {
    response.set('Cache-Control', 'no-store');
    next();
  });
  // A foreign page is refused before its cookie is looked at or its body is read.
  app.use('/api', originCheck(settings.PUBLIC_URL));
  app.use('/api/docs', apiDocs());
  useSessions(app, settings);
  mount(app, routes);
  app.use('/api', () => {
    throw new NotFound('This address');
  });
  app.use(clientFiles());
  app.use(errorHandler);
  return app;
}
