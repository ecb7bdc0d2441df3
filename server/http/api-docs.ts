import { createRequire } from 'node:module';
import { dirname } from 'node:path';
import { Router, static as files } from 'express';
import { docsScript, docsStyle } from './api-docs-page';

const kept = new Set(['/swagger-ui.css', '/swagger-ui-bundle.js']);

/** What the page of the description is made of, all from this server and without inline script. */
export function apiDocs(): Router {
  const folder = dirname(createRequire(import.meta.url).resolve('swagger-ui-dist/package.json'));
  const router = Router();
  router.get('/start.js', (_request, response) => {
    response.type('text/javascript').send(docsScript);
  });
  router.get('/colours.css', (_request, response) => {
    response.type('text/css').send(docsStyle);
  });
  const serve = files(folder, { index: false, redirect: false });
  router.use((request, response, next) =>
    kept.has(request.path) ? serve(request, response, next) : next(),
  );
  return router;
}
