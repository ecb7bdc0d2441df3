import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { endpoints } from '@shared/contract';
import { startApi, type Api } from '../support/api';

interface Operation {
  operationId: string;
  responses: Record<string, { content: Record<string, unknown> }>;
  requestBody?: { content: Record<string, unknown> };
  parameters?: { name: string; in: string; required?: boolean }[];
}
interface Document {
  openapi: string;
  paths: Record<string, Record<string, Operation>>;
  components: { schemas: Record<string, unknown> };
}

let api: Api;
let document: Document;
beforeAll(async () => {
  api = await startApi();
  document = (await api.stranger().get('/api/openapi.json').expect(200)).body as Document;
});
afterAll(() => api.close());

const operationOf = (path: string, method: string) =>
  document.paths[path.replace(/:([A-Za-z]+)/g, '{$1}')]?.[method];

describe('the description of the interface', () => {
  it('is OpenAPI 3.1 and names every endpoint of the contract once', () => {
    expect(document.openapi).toMatch(/^3\.1\./);
    const described = Object.values(document.paths).flatMap((methods) =>
      Object.values(methods).map((operation) => operation.operationId),
    );
    expect(described.sort()).toEqual(endpoints.map(({ name }) => name).sort());
  });

  it('refers to nothing that it does not hold', () => {
    const references = [...JSON.stringify(document).matchAll(/"#\/components\/schemas\/([^"]+)"/g)];
    expect(references.length).toBeGreaterThan(50);
    for (const [, name] of references) expect(document.components.schemas).toHaveProperty(name!);
  });

  it('says for each endpoint how it succeeds, what it takes and that it can be refused', () => {
    for (const { endpoint } of endpoints) {
      const operation = operationOf(endpoint.path, endpoint.method)!;
      const success = operation.responses[endpoint.status ?? 200];
      expect(Object.keys(success!.content)).toEqual([endpoint.produces ?? 'application/json']);
      if (endpoint.roles !== 'anyone') expect(operation.responses).toHaveProperty('401');
      if (endpoint.files)
        expect(operation.requestBody!.content).toHaveProperty('multipart/form-data');
      if (endpoint.method !== 'get')
        expect(operation.parameters).toContainEqual(
          expect.objectContaining({ name: 'X-Quartzhold', in: 'header', required: true }),
        );
      for (const [, name] of endpoint.path.matchAll(/:([A-Za-z]+)/g))
        expect(operation.parameters).toContainEqual(
          expect.objectContaining({ name, in: 'path', required: true }),
        );
    }
  });
});

describe('its page', () => {
  it('is served whole from this server, under the same closed policy', async () => {
    const page = await api.stranger().get('/api/docs').expect(200).expect('Content-Type', /html/);
    expect(page.headers['content-security-policy']).toContain("script-src 'self'");
    expect(page.text).not.toMatch(/<script>|<style>|https?:\/\//);
    const parts = [...page.text.matchAll(/(?:src|href)="(\/api\/docs\/[^"]+)"/g)].map(
      ([, p]) => p!,
    );
    expect(parts).toHaveLength(4);
    for (const part of parts) await api.stranger().get(part).expect(200);
  });

  it('gives out nothing else of the package it is made of', async () => {
    await api.stranger().get('/api/docs/package.json').expect(404);
    await api.stranger().get('/api/docs/swagger-ui-bundle.js.map').expect(404);
  });
});
