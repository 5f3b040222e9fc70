import { buildDocument } from '@/lib/http/openapi/build-document';
import { route, type RouteHandler } from '@/lib/http/route';
import packageFacts from '@/package.json';
import { registeredRoutes } from './registered-routes';

export const GET: RouteHandler = route({
  access: 'public',
  action: null,
  summary: 'This document',
  returns: { contentTypes: ['application/json'] },
  handle: () =>
    Response.json(
      buildDocument(
        [...registeredRoutes, { path: '/api/v1/openapi.json', methods: { GET } }],
        packageFacts.version,
      ),
    ),
});
