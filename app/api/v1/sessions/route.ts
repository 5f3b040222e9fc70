import { idSchema, pageOf, pageQuerySchema } from '@/lib/contracts/common';
import { createSessionSchema, sessionSchema } from '@/lib/contracts/session';
import { route } from '@/lib/http/route';
import { createSession } from '@/lib/services/sessions/create-session';
import { listSessions } from '@/lib/services/sessions/list-sessions';

export const GET = route({
  access: 'lab',
  action: 'session.read',
  summary: "A study's recording sessions, or all of the lab's, newest first",
  query: pageQuerySchema.extend({ studyId: idSchema.optional() }),
  returns: pageOf(sessionSchema),
  handle: ({ ctx, query }) => listSessions(ctx, query),
});

export const POST = route({
  access: 'lab',
  action: 'session.create',
  summary: 'A new recording session of an animal',
  body: createSessionSchema,
  returns: sessionSchema,
  status: 201,
  handle: ({ ctx, body }) => createSession(ctx, body),
});
