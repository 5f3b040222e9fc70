import { healthSchema } from '@/lib/contracts/health';
import { route } from '@/lib/http/route';
import { getHealth } from '@/lib/services/health/get-health';

export const dynamic = 'force-dynamic';

export const GET = route({
  access: 'public',
  action: null,
  summary: 'Whether every part of the service answers',
  returns: healthSchema,
  statusOf: (health) => (health.state === 'ready' ? 200 : 503),
  handle: () => getHealth(),
});
