import { z } from 'zod';
import { pageOf } from '@/lib/contracts/common';
import { idParamsSchema } from '@/lib/contracts/params';
import { predictionSchema } from '@/lib/contracts/readout';
import { route } from '@/lib/http/route';
import { listPredictions } from '@/lib/services/readouts/list-predictions';
import { sendPredictions } from '@/lib/services/readouts/send-predictions';

export const GET = route({
  access: 'lab',
  action: 'readout.read',
  summary:
    'Held-out predictions: pages of JSON, or all of them as text/csv or application/vnd.apache.arrow.stream (by Accept)',
  params: idParamsSchema,
  query: z.strictObject({
    cursor: z.string().max(500).optional(),
    limit: z.coerce.number().int().min(1).max(5_000).default(1_000),
  }),
  returns: pageOf(predictionSchema),
  handle: async ({ ctx, params, query, request }) =>
    (await sendPredictions(ctx, { readoutId: params.id, accept: request.headers.get('accept') })) ??
    (await listPredictions(ctx, { readoutId: params.id, ...query })),
});
