import { idParamsSchema } from '@/lib/contracts/params';
import { createReadoutSchema, readoutEstimateSchema } from '@/lib/contracts/readout';
import { route } from '@/lib/http/route';
import { estimateReadout } from '@/lib/services/readouts/estimate-readout';

export const POST = route({
  access: 'lab',
  action: 'readout.read',
  summary: 'What a recipe would take and what is wrong with it; nothing is made',
  params: idParamsSchema,
  body: createReadoutSchema,
  maxBytes: 8 * 1024 * 1024 + 256 * 1024,
  returns: readoutEstimateSchema,
  handle: ({ ctx, params, body }) => estimateReadout(ctx, { sessionId: params.id, ...body }),
});
