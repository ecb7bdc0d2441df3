import { resolve } from 'node:path';
import { static as files, Router, type RequestHandler } from 'express';

const folder = resolve('dist/client');
const page: RequestHandler = (request, response, next) => {
  // A missing picture or script is missing; only addresses of pages get the page.
  if (/\.[a-z0-9]{1,8}$/i.test(request.path)) return next();
  response.set('Cache-Control', 'no-store');
  response.sendFile('index.html', { root: folder }, (error) => {
    if (error && !response.headersSent) next();
  });
};

/** The built pages: named by content, so kept for a year; the page itself is asked for each time. */
export function clientFiles(): Router {
  const router = Router();
  router.use(
    '/assets',
    files(resolve(folder, 'assets'), {
      index: false,
      redirect: false,
      immutable: true,
      maxAge: '1y',
    }),
  );
  router.use(files(folder, { index: false, redirect: false, dotfiles: 'ignore', maxAge: '1h' }));
  router.get('/{*page}', page);
  router.use((_request, response) => {
    response.status(404).type('text').send('There is nothing at this address.');
  });
  return router;
}
