import { z } from 'zod';
import { idSchema } from '@/lib/contracts/common';
import { route } from '@/lib/http/route';
import { streamEvents } from '@/lib/services/readouts/stream-events';

export const GET = route({
  access: 'lab',
  action: 'events.read',
  summary: 'Server-sent events of one session: states and progress, the present ones first',
  query: z.strictObject({ session: idSchema }),
  returns: { contentTypes: ['text/event-stream'] },
  handle: ({ ctx, query, request }) =>
    streamEvents(ctx, { sessionId: query.session, signal: request.signal }),
});
