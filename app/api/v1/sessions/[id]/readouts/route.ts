import { pageOf, pageQuerySchema } from '@/lib/contracts/common';
import { idParamsSchema } from '@/lib/contracts/params';
import { createReadoutSchema, readoutSchema, readoutSummarySchema } from '@/lib/contracts/readout';
import { route } from '@/lib/http/route';
import { createReadout } from '@/lib/services/readouts/create-readout';
import { listReadouts } from '@/lib/services/readouts/list-readouts';

export const GET = route({
  access: 'lab',
  action: 'readout.read',
  summary: "A session's readouts, newest first, failed and cancelled ones too",
  params: idParamsSchema,
  query: pageQuerySchema,
  returns: pageOf(readoutSummarySchema),
  handle: ({ ctx, params, query }) => listReadouts(ctx, { sessionId: params.id, ...query }),
});

export const POST = route({
  access: 'lab',
  action: 'readout.create',
  summary: 'A new readout of a session; everything but the label may be left out of the recipe',
  params: idParamsSchema,
  body: createReadoutSchema,
  // Given permutations come inline up to 8 MiB; the rest is for what stands beside them.
  maxBytes: 8 * 1024 * 1024 + 256 * 1024,
  returns: readoutSchema,
  status: 201,
  handle: ({ ctx, params, body }) => createReadout(ctx, { sessionId: params.id, ...body }),
});
