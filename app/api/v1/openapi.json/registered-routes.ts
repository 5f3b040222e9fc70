// Written by scripts/list-routes.mjs; run it again when a route is added.
import type { RegisteredRoute } from '@/lib/http/openapi/registered-route';
import * as route0 from '@/app/api/health/route';
import * as route1 from '@/app/api/v1/animals/[id]/route';
import * as route2 from '@/app/api/v1/animals/route';
import * as route3 from '@/app/api/v1/audit/route';
import * as route4 from '@/app/api/v1/audit/verification/route';
import * as route5 from '@/app/api/v1/events/route';
import * as route6 from '@/app/api/v1/files/[id]/complete/route';
import * as route7 from '@/app/api/v1/files/[id]/parts/[n]/route';
import * as route8 from '@/app/api/v1/files/[id]/route';
import * as route9 from '@/app/api/v1/invitations/[id]/route';
import * as route10 from '@/app/api/v1/invitations/accept/route';
import * as route11 from '@/app/api/v1/invitations/look/route';
import * as route12 from '@/app/api/v1/invitations/route';
import * as route13 from '@/app/api/v1/me/password/route';
import * as route14 from '@/app/api/v1/me/route';
import * as route15 from '@/app/api/v1/me/sign-ins/[id]/route';
import * as route16 from '@/app/api/v1/me/sign-ins/end-others/route';
import * as route17 from '@/app/api/v1/me/sign-ins/route';
import * as route18 from '@/app/api/v1/members/[id]/route';
import * as route19 from '@/app/api/v1/members/route';
import * as route20 from '@/app/api/v1/password-resets/complete/route';
import * as route21 from '@/app/api/v1/password-resets/route';
import * as route22 from '@/app/api/v1/readouts/[id]/cancel/route';
import * as route23 from '@/app/api/v1/readouts/[id]/predictions/route';
import * as route24 from '@/app/api/v1/readouts/[id]/route';
import * as route25 from '@/app/api/v1/sessions/[id]/data/trials/route';
import * as route26 from '@/app/api/v1/sessions/[id]/data/units/route';
import * as route27 from '@/app/api/v1/sessions/[id]/exclusions/route';
import * as route28 from '@/app/api/v1/sessions/[id]/files/route';
import * as route29 from '@/app/api/v1/sessions/[id]/intake/preview/route';
import * as route30 from '@/app/api/v1/sessions/[id]/intake/proposal/route';
import * as route31 from '@/app/api/v1/sessions/[id]/intake/route';
import * as route32 from '@/app/api/v1/sessions/[id]/readouts/estimate/route';
import * as route33 from '@/app/api/v1/sessions/[id]/readouts/route';
import * as route34 from '@/app/api/v1/sessions/[id]/route';
import * as route35 from '@/app/api/v1/sessions/route';
import * as route36 from '@/app/api/v1/studies/[id]/route';
import * as route37 from '@/app/api/v1/studies/route';
import * as route38 from '@/app/api/v1/tokens/[id]/route';
import * as route39 from '@/app/api/v1/tokens/route';

export const registeredRoutes: readonly RegisteredRoute[] = [
  { path: '/api/health', methods: { GET: route0.GET } },
  { path: '/api/v1/animals/{id}', methods: { GET: route1.GET, PATCH: route1.PATCH } },
  { path: '/api/v1/animals', methods: { GET: route2.GET, POST: route2.POST } },
  { path: '/api/v1/audit', methods: { GET: route3.GET } },
  { path: '/api/v1/audit/verification', methods: { GET: route4.GET } },
  { path: '/api/v1/events', methods: { GET: route5.GET } },
  { path: '/api/v1/files/{id}/complete', methods: { POST: route6.POST } },
  { path: '/api/v1/files/{id}/parts/{n}', methods: { PUT: route7.PUT } },
  { path: '/api/v1/files/{id}', methods: { GET: route8.GET, DELETE: route8.DELETE } },
  { path: '/api/v1/invitations/{id}', methods: { DELETE: route9.DELETE } },
  { path: '/api/v1/invitations/accept', methods: { POST: route10.POST } },
  { path: '/api/v1/invitations/look', methods: { POST: route11.POST } },
  { path: '/api/v1/invitations', methods: { GET: route12.GET, POST: route12.POST } },
  { path: '/api/v1/me/password', methods: { POST: route13.POST } },
  { path: '/api/v1/me', methods: { GET: route14.GET } },
  { path: '/api/v1/me/sign-ins/{id}', methods: { DELETE: route15.DELETE } },
  { path: '/api/v1/me/sign-ins/end-others', methods: { POST: route16.POST } },
  { path: '/api/v1/me/sign-ins', methods: { GET: route17.GET } },
  { path: '/api/v1/members/{id}', methods: { PATCH: route18.PATCH, DELETE: route18.DELETE } },
  { path: '/api/v1/members', methods: { GET: route19.GET } },
  { path: '/api/v1/password-resets/complete', methods: { POST: route20.POST } },
  { path: '/api/v1/password-resets', methods: { POST: route21.POST } },
  { path: '/api/v1/readouts/{id}/cancel', methods: { POST: route22.POST } },
  { path: '/api/v1/readouts/{id}/predictions', methods: { GET: route23.GET } },
  { path: '/api/v1/readouts/{id}', methods: { GET: route24.GET } },
  { path: '/api/v1/sessions/{id}/data/trials', methods: { GET: route25.GET } },
  { path: '/api/v1/sessions/{id}/data/units', methods: { GET: route26.GET } },
  { path: '/api/v1/sessions/{id}/exclusions', methods: { GET: route27.GET, POST: route27.POST } },
  { path: '/api/v1/sessions/{id}/files', methods: { GET: route28.GET, POST: route28.POST } },
  { path: '/api/v1/sessions/{id}/intake/preview', methods: { POST: route29.POST } },
  { path: '/api/v1/sessions/{id}/intake/proposal', methods: { GET: route30.GET } },
  { path: '/api/v1/sessions/{id}/intake', methods: { POST: route31.POST } },
  { path: '/api/v1/sessions/{id}/readouts/estimate', methods: { POST: route32.POST } },
  { path: '/api/v1/sessions/{id}/readouts', methods: { GET: route33.GET, POST: route33.POST } },
  { path: '/api/v1/sessions/{id}', methods: { GET: route34.GET, PATCH: route34.PATCH } },
  { path: '/api/v1/sessions', methods: { GET: route35.GET, POST: route35.POST } },
  { path: '/api/v1/studies/{id}', methods: { GET: route36.GET, PATCH: route36.PATCH } },
  { path: '/api/v1/studies', methods: { GET: route37.GET, POST: route37.POST } },
  { path: '/api/v1/tokens/{id}', methods: { DELETE: route38.DELETE } },
  { path: '/api/v1/tokens', methods: { GET: route39.GET, POST: route39.POST } },
];
