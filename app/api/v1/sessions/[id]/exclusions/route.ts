import { z } from 'zod';
import { idParamsSchema } from '@/lib/contracts/params';
import { createExclusionSchema, exclusionListSchema } from '@/lib/contracts/session';
import { route } from '@/lib/http/route';
import { createExclusion } from '@/lib/services/exclusions/create-exclusion';
import { listExclusions } from '@/lib/services/exclusions/list-exclusions';

export const GET = route({
  access: 'lab',
  action: 'exclusion.read',
  summary: "A session's exclusions, as they are or as they were at a version",
  params: idParamsSchema,
  query: z.strictObject({ version: z.coerce.number().int().nonnegative().optional() }),
  returns: exclusionListSchema,
  handle: ({ ctx, params, query }) => listExclusions(ctx, { sessionId: params.id, ...query }),
});

export const POST = route({
  access: 'lab',
  action: 'exclusion.create',
  summary: 'Leave trials or units out with a reason, or put them back',
  params: idParamsSchema,
  body: createExclusionSchema,
  maxBytes: 16 * 1024 * 1024,
  returns: exclusionListSchema,
  status: 201,
  handle: ({ ctx, params, body }) => createExclusion(ctx, { sessionId: params.id, exclusion: body }),
});
