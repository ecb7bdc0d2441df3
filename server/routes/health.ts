import * as contract from '@shared/contract/health';
import { docsPage } from '../http/api-docs-page';
import { openApi } from '../http/openapi';
import { route } from '../http/route';
import { readHealth } from '../services/health/read-health';

export const healthRoutes = [
  route(contract.readHealth, async ({ actor, response }) => {
    const detailed = actor?.role === 'administrator';
    const checks = await readHealth(detailed);
    const health = {
      status: checks.every((check) => check.ok) ? ('ok' as const) : ('degraded' as const),
      version: detailed ? (process.env.npm_package_version ?? '0.1.0') : '',
      now: new Date().toISOString(),
      checks: detailed ? checks : [],
    };
    if (checks[0]!.ok) return health;
    // Only what stops every request makes the server unfit; the rest degrades it and needs somebody to look.
    response.status(503).json(health);
    return undefined;
  }),
  route(contract.readOpenApi, async ({ response }) => {
    response.json(openApi());
  }),
  route(contract.readDocs, async ({ response }) => {
    response.type('html').send(docsPage);
  }),
];
