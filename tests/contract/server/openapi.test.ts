import { readdirSync, readFileSync } from 'node:fs';
import { Validator } from '@seriousme/openapi-schema-validator';
import { describe, expect, it } from 'vitest';
import { GET } from '@/app/api/v1/openapi.json/route';
import { requireServices } from '@/tests/support/services';

requireServices();
const response = await GET(new Request('http://127.0.0.1:3000/api/v1/openapi.json'), {
  params: Promise.resolve({}),
});
const text = await response.text();
interface Operation {
  operationId: string;
  summary?: string;
  responses: Record<string, unknown>;
}
const document = JSON.parse(text) as {
  openapi: string;
  paths: Record<string, Record<string, Operation>>;
  components: { schemas: Record<string, unknown>; responses: Record<string, unknown> };
};

describe('/api/v1/openapi.json', () => {
  it('is served to anybody', () => {
    expect(response.status).toBe(200);
    expect(response.headers.get('content-type')).toContain('application/json');
  });

  // The schema of OpenAPI 3.1 documents as published by the OpenAPI Initiative, carried by the validator package.
  it('is a valid OpenAPI 3.1 document', async () => {
    const validator = new Validator();
    const result = await validator.validate(JSON.parse(text) as Record<string, unknown>);
    expect(result.errors ?? []).toEqual([]);
    expect(result.valid).toBe(true);
    expect(validator.version).toBe('3.1');
  });

  it('has every method of every route file under app/api/v1, and health', () => {
    const files = readdirSync('app/api/v1', { recursive: true })
      .map((name) => `app/api/v1/${String(name)}`)
      .filter((name) => name.endsWith('/route.ts'));
    expect(files.length).toBeGreaterThan(10);
    const wanted = [...files, 'app/api/health/route.ts'].flatMap((file) => {
      const path = file
        .replace(/^app/, '')
        .replace(/\/route\.ts$/, '')
        .replaceAll(/\[(\w+)\]/g, '{$1}');
      const source = readFileSync(file, 'utf8');
      return [
        ...source.matchAll(/^export (?:const|async function|function) (GET|POST|PUT|PATCH|DELETE)\b/gm),
      ].map(([, method]) => `${method} ${path}`);
    });
    const told = Object.entries(document.paths).flatMap(([path, item]) =>
      Object.keys(item).map((method) => `${method.toUpperCase()} ${path}`),
    );
    expect(told.sort()).toEqual(wanted.sort());
  });

  it('has a name of its own and a summary for every operation', () => {
    const operations = Object.values(document.paths).flatMap((item) => Object.values(item));
    const ids = operations.map(({ operationId }) => operationId);
    expect(new Set(ids).size).toBe(ids.length);
    for (const operation of operations) expect(operation.summary, operation.operationId).toBeTruthy();
  });

  it('refers to nothing that is not there', () => {
    const references = [...text.matchAll(/"\$ref":"([^"]+)"/g)].map(([, reference]) => reference);
    expect(references.length).toBeGreaterThan(20);
    for (const reference of new Set(references)) {
      const target = reference
        .replace(/^#\//, '')
        .split('/')
        .reduce<unknown>((value, key) => (value as Record<string, unknown> | undefined)?.[key], document);
      expect(target, reference).toBeTypeOf('object');
    }
  });

  it('tells the names that scripts live by', () => {
    for (const path of [
      '/api/v1/tokens',
      '/api/v1/studies',
      '/api/v1/animals',
      '/api/v1/sessions',
      '/api/v1/sessions/{id}',
      '/api/v1/sessions/{id}/files',
      '/api/v1/files/{id}',
      '/api/v1/files/{id}/parts/{n}',
      '/api/v1/files/{id}/complete',
      '/api/v1/sessions/{id}/exclusions',
      '/api/v1/sessions/{id}/readouts',
      '/api/v1/readouts/{id}',
      '/api/v1/readouts/{id}/cancel',
      '/api/v1/readouts/{id}/predictions',
      '/api/v1/events',
    ])
      expect(document.paths, path).toHaveProperty([path]);
  });
});
