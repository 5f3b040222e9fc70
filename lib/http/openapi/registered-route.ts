import type { RouteHandler } from '@/lib/http/route';

export const httpMethods = ['GET', 'POST', 'PUT', 'PATCH', 'DELETE'] as const;
export type HttpMethod = (typeof httpMethods)[number];

/** A path in OpenAPI's spelling (/api/v1/studies/{id}) and what its route file exports. */
export interface RegisteredRoute {
  path: string;
  methods: Partial<Record<HttpMethod, RouteHandler>>;
}
