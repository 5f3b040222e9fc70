import { idParamsSchema } from '@/lib/contracts/params';
import { changeSessionSchema, sessionSchema } from '@/lib/contracts/session';
import { route } from '@/lib/http/route';
import { changeSession } from '@/lib/services/sessions/change-session';
import { getSession } from '@/lib/services/sessions/get-session';

export const GET = route({
  access: 'lab',
  action: 'session.read',
  summary: 'One recording session with the facts of its data',
  params: idParamsSchema,
  returns: sessionSchema,
  handle: ({ ctx, params }) => getSession(ctx, { sessionId: params.id }),
});

export const PATCH = route({
  access: 'lab',
  action: 'session.change',
  summary: "Change a recording session's name or start",
  params: idParamsSchema,
  body: changeSessionSchema,
  requiresVersion: true,
  returns: sessionSchema,
  handle: ({ ctx, params, body, ifVersion }) =>
    changeSession(ctx, { sessionId: params.id, ifVersion, change: body }),
});
