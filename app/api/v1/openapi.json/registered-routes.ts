// Written by scripts/list-routes.mjs; run it again when a route is added.
import type { RegisteredRoute } from '@/lib/http/openapi/registered-route';
import * as route0 from '@/app/api/health/route';
import * as route1 from '@/app/api/v1/animals/[id]/route';
import * as route2 from '@/app/api/v1/animals/route';
import * as route3 from '@/app/api/v1/events/route';
import * as route4 from '@/app/api/v1/files/[id]/complete/route';
import * as route5 from '@/app/api/v1/files/[id]/parts/[n]/route';
import * as route6 from '@/app/api/v1/files/[id]/route';
import * as route7 from '@/app/api/v1/me/route';
import * as route8 from '@/app/api/v1/readouts/[id]/cancel/route';
import * as route9 from '@/app/api/v1/readouts/[id]/predictions/route';
import * as route10 from '@/app/api/v1/readouts/[id]/route';
import * as route11 from '@/app/api/v1/sessions/[id]/data/trials/route';
import * as route12 from '@/app/api/v1/sessions/[id]/data/units/route';
import * as route13 from '@/app/api/v1/sessions/[id]/exclusions/route';
import * as route14 from '@/app/api/v1/sessions/[id]/files/route';
import * as route15 from '@/app/api/v1/sessions/[id]/intake/preview/route';
import * as route16 from '@/app/api/v1/sessions/[id]/intake/proposal/route';
import * as route17 from '@/app/api/v1/sessions/[id]/intake/route';
import * as route18 from '@/app/api/v1/sessions/[id]/readouts/estimate/route';
import * as route19 from '@/app/api/v1/sessions/[id]/readouts/route';
import * as route20 from '@/app/api/v1/sessions/[id]/route';
import * as route21 from '@/app/api/v1/sessions/route';
import * as route22 from '@/app/api/v1/studies/[id]/route';
import * as route23 from '@/app/api/v1/studies/route';
import * as route24 from '@/app/api/v1/tokens/[id]/route';
import * as route25 from '@/app/api/v1/tokens/route';

export const registeredRoutes: readonly RegisteredRoute[] = [
  { path: '/api/health', methods: { GET: route0.GET } },
  { path: '/api/v1/animals/{id}', methods: { GET: route1.GET, PATCH: route1.PATCH } },
  { path: '/api/v1/animals', methods: { GET: route2.GET, POST: route2.POST } },
  { path: '/api/v1/events', methods: { GET: route3.GET } },
  { path: '/api/v1/files/{id}/complete', methods: { POST: route4.POST } },
  { path: '/api/v1/files/{id}/parts/{n}', methods: { PUT: route5.PUT } },
  { path: '/api/v1/files/{id}', methods: { GET: route6.GET, DELETE: route6.DELETE } },
  { path: '/api/v1/me', methods: { GET: route7.GET } },
  { path: '/api/v1/readouts/{id}/cancel', methods: { POST: route8.POST } },
  { path: '/api/v1/readouts/{id}/predictions', methods: { GET: route9.GET } },
  { path: '/api/v1/readouts/{id}', methods: { GET: route10.GET } },
  { path: '/api/v1/sessions/{id}/data/trials', methods: { GET: route11.GET } },
  { path: '/api/v1/sessions/{id}/data/units', methods: { GET: route12.GET } },
  { path: '/api/v1/sessions/{id}/exclusions', methods: { GET: route13.GET, POST: route13.POST } },
  { path: '/api/v1/sessions/{id}/files', methods: { GET: route14.GET, POST: route14.POST } },
  { path: '/api/v1/sessions/{id}/intake/preview', methods: { POST: route15.POST } },
  { path: '/api/v1/sessions/{id}/intake/proposal', methods: { GET: route16.GET } },
  { path: '/api/v1/sessions/{id}/intake', methods: { POST: route17.POST } },
  { path: '/api/v1/sessions/{id}/readouts/estimate', methods: { POST: route18.POST } },
  { path: '/api/v1/sessions/{id}/readouts', methods: { GET: route19.GET, POST: route19.POST } },
  { path: '/api/v1/sessions/{id}', methods: { GET: route20.GET, PATCH: route20.PATCH } },
  { path: '/api/v1/sessions', methods: { GET: route21.GET, POST: route21.POST } },
  { path: '/api/v1/studies/{id}', methods: { GET: route22.GET, PATCH: route22.PATCH } },
  { path: '/api/v1/studies', methods: { GET: route23.GET, POST: route23.POST } },
  { path: '/api/v1/tokens/{id}', methods: { DELETE: route24.DELETE } },
  { path: '/api/v1/tokens', methods: { GET: route25.GET, POST: route25.POST } },
];
