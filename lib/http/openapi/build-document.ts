import { z } from 'zod';
import { errorCodes, type ErrorCode } from '@/lib/errors/app-error';
import type { RouteDefinition } from '@/lib/http/route-definition';
import { httpMethods, type HttpMethod, type RegisteredRoute } from './registered-route';
import { toSchemaObject } from './to-schema-object';

type JsonObject = Record<string, unknown>;

/** The OpenAPI 3.1 document of these routes, made from the very schemas that check the requests and answers. Pure. */
export function buildDocument(routes: readonly RegisteredRoute[], version: string): JsonObject {
  const schemas: JsonObject = { Error: errorSchema() };
  const paths: JsonObject = {};
  for (const { path, methods } of [...routes].sort((a, b) => (a.path < b.path ? -1 : 1))) {
    const item: JsonObject = {};
    for (const method of httpMethods) {
      const handler = methods[method];
      if (handler !== undefined)
        item[method.toLowerCase()] = operation(path, method, handler.definition, schemas);
    }
    paths[path] = item;
  }
  return {
    openapi: '3.1.0',
    info: {
      title: 'Outfold',
      version,
      description:
        'Leak-free cross-validated population readouts, kept on record per recording session. Rows, units and bins count from 0. Errors are problem+json (RFC 9457).',
    },
    servers: [{ url: '/' }],
    security: [{ bearer: [] }, { session: [] }],
    paths,
    components: {
      schemas: Object.fromEntries(Object.entries(schemas).sort(([a], [b]) => (a < b ? -1 : 1))),
      responses: errorResponses(),
      securitySchemes: {
        bearer: { type: 'http', scheme: 'bearer', description: 'A token from POST /api/v1/tokens.' },
        session: {
          type: 'apiKey',
          in: 'cookie',
          name: 'outfold.session',
          description: 'A signed-in browser.',
        },
        basic: { type: 'http', scheme: 'basic', description: 'Email and password, for making a token only.' },
      },
    },
  };
}

function operation(
  path: string,
  method: HttpMethod,
  definition: RouteDefinition,
  schemas: JsonObject,
): JsonObject {
  const status = definition.status ?? 200;
  const responses: JsonObject = { [status]: success(definition, status, schemas) };
  for (const code of codesOf(definition, method))
    responses[errorCodes[code].status] = { $ref: `#/components/responses/${code}` };
  if (definition.statusOf) responses['503'] = success(definition, 503, schemas);
  const body = requestBody(definition, schemas);
  return {
    operationId: operationId(path, method),
    tags: [path.replace(/^\/api\/(v1\/)?/, '').split('/')[0]],
    ...(definition.summary === undefined ? {} : { summary: definition.summary }),
    ...(definition.access === 'public' ? { security: [] } : {}),
    ...(definition.access === 'signedIn' ? { security: [{ session: [] }] } : {}),
    ...(definition.access === 'labOrBasic'
      ? { security: [{ bearer: [] }, { session: [] }, { basic: [] }] }
      : {}),
    parameters: [
      ...pathParameters(path),
      ...queryParameters(definition, schemas),
      ...headerParameters(definition, method),
    ],
    ...(body === null ? {} : { requestBody: body }),
    responses,
    ...(definition.action === null ? {} : { 'x-outfold-action': definition.action }),
  };
}

/** getStudiesId, postSessionsIdFiles …: unique, because path and method are. */
function operationId(path: string, method: HttpMethod): string {
  const words = path
    .replace(/^\/api\/(v1\/)?/, '')
    .split(/[^A-Za-z0-9]+/)
    .filter(Boolean);
  return method.toLowerCase() + words.map((word) => word[0].toUpperCase() + word.slice(1)).join('');
}

function codesOf(definition: RouteDefinition, method: HttpMethod): ErrorCode[] {
  const hasBody = definition.body !== undefined && definition.body !== 'none';
  const hasJson = hasBody && definition.body !== 'stream';
  return [
    ...(hasJson ? (['malformed-request', 'unsupported-format'] as const) : []),
    ...(definition.access === 'public' ? [] : (['unauthenticated', 'forbidden'] as const)),
    ...(definition.params === undefined ? [] : (['not-found'] as const)),
    ...(method === 'GET' ? [] : (['conflict'] as const)),
    ...(definition.requiresVersion ? (['stale-version', 'version-required'] as const) : []),
    ...(hasBody ? (['too-large'] as const) : []),
    ...(hasJson || definition.query !== undefined ? (['invalid-input'] as const) : []),
    'rate-limited',
    'internal',
    'unavailable',
  ];
}

function success(definition: RouteDefinition, status: number, schemas: JsonObject): JsonObject {
  if (status === 204) return { description: 'Done; there is nothing to tell.' };
  const { returns } = definition;
  const content: JsonObject = {};
  if (returns instanceof z.ZodType)
    content['application/json'] = { schema: toSchemaObject(returns, 'output', schemas) };
  else for (const type of returns.contentTypes) content[type] = {};
  return {
    description:
      status === 201 ? 'Made.' : status === 202 ? 'Taken on.' : status === 503 ? 'A part is away.' : 'Done.',
    content,
  };
}

function requestBody(definition: RouteDefinition, schemas: JsonObject): JsonObject | null {
  const { body } = definition;
  if (body === undefined || body === 'none') return null;
  if (body === 'stream') return { required: true, content: { 'application/octet-stream': {} } };
  return {
    required: true,
    content: { 'application/json': { schema: toSchemaObject(body, 'input', schemas) } },
  };
}

function pathParameters(path: string): JsonObject[] {
  return [...path.matchAll(/\{(\w+)\}/g)].map(([, name]) => ({
    name,
    in: 'path',
    required: true,
    schema: name === 'id' ? { type: 'string', format: 'uuid' } : { type: 'string' },
  }));
}

function queryParameters(definition: RouteDefinition, schemas: JsonObject): JsonObject[] {
  if (definition.query === undefined) return [];
  const schema = toSchemaObject(definition.query, 'input', schemas) as {
    properties?: JsonObject;
    required?: string[];
  };
  return Object.entries(schema.properties ?? {}).map(([name, property]) => ({
    name,
    in: 'query',
    required: schema.required?.includes(name) ?? false,
    schema: property,
  }));
}

function headerParameters(definition: RouteDefinition, method: HttpMethod): JsonObject[] {
  const parameters: JsonObject[] = [];
  if (method === 'POST' && definition.access !== 'public' && definition.body !== 'stream')
    parameters.push({
      name: 'Idempotency-Key',
      in: 'header',
      required: false,
      description: 'A repeat of the same request under the same key is carried out once and answered alike.',
      schema: { type: 'string', maxLength: 200 },
    });
  if (definition.requiresVersion)
    parameters.push({
      name: 'If-Match',
      in: 'header',
      required: true,
      description: 'The ETag of the version that is to be changed.',
      schema: { type: 'string' },
    });
  return parameters;
}

function errorSchema(): JsonObject {
  return {
    type: 'object',
    required: ['type', 'title', 'status', 'detail', 'code', 'requestId', 'errors'],
    properties: {
      type: { type: 'string', format: 'uri-reference' },
      title: { type: 'string' },
      status: { type: 'integer' },
      detail: { type: 'string' },
      code: { enum: Object.keys(errorCodes) },
      requestId: { type: 'string' },
      errors: {
        type: 'array',
        items: {
          type: 'object',
          required: ['pointer', 'code', 'detail'],
          properties: { pointer: { type: 'string' }, code: { type: 'string' }, detail: { type: 'string' } },
        },
      },
    },
  };
}

function errorResponses(): JsonObject {
  const content = { 'application/problem+json': { schema: { $ref: '#/components/schemas/Error' } } };
  const retryAfter = {
    headers: { 'Retry-After': { description: 'Seconds to wait.', schema: { type: 'integer' } } },
  };
  return Object.fromEntries(
    Object.entries(errorCodes).map(([code, { title, status }]) => [
      code,
      { description: `${title}.`, ...(status === 429 || status === 503 ? retryAfter : {}), content },
    ]),
  );
}
