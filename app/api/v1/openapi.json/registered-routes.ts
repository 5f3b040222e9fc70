// Written by scripts/list-routes.mjs; run it again when a route is added.
import type { RegisteredRoute } from '@/lib/http/openapi/registered-route';
import * as route0 from '@/app/api/health/route';
import * as route1 from '@/app/api/v1/animals/[id]/route';
import * as route2 from '@/app/api/v1/animals/route';
import * as route3 from '@/app/api/v1/me/route';
import * as route4 from '@/app/api/v1/sessions/[id]/exclusions/route';
import * as route5 from '@/app/api/v1/sessions/[id]/route';
import * as route6 from '@/app/api/v1/sessions/route';
import * as route7 from '@/app/api/v1/studies/[id]/route';
import * as route8 from '@/app/api/v1/studies/route';
import * as route9 from '@/app/api/v1/tokens/[id]/route';
import * as route10 from '@/app/api/v1/tokens/route';

export const registeredRoutes: readonly RegisteredRoute[] = [
  { path: '/api/health', methods: { GET: route0.GET } },
  { path: '/api/v1/animals/{id}', methods: { GET: route1.GET, PATCH: route1.PATCH } },
  { path: '/api/v1/animals', methods: { GET: route2.GET, POST: route2.POST } },
  { path: '/api/v1/me', methods: { GET: route3.GET } },
  { path: '/api/v1/sessions/{id}/exclusions', methods: { GET: route4.GET, POST: route4.POST } },
  { path: '/api/v1/sessions/{id}', methods: { GET: route5.GET, PATCH: route5.PATCH } },
  { path: '/api/v1/sessions', methods: { GET: route6.GET, POST: route6.POST } },
  { path: '/api/v1/studies/{id}', methods: { GET: route7.GET, PATCH: route7.PATCH } },
  { path: '/api/v1/studies', methods: { GET: route8.GET, POST: route8.POST } },
  { path: '/api/v1/tokens/{id}', methods: { DELETE: route9.DELETE } },
  { path: '/api/v1/tokens', methods: { GET: route10.GET, POST: route10.POST } },
];
