import { idParamsSchema } from '@/lib/contracts/params';
import { readoutSchema } from '@/lib/contracts/readout';
import { route } from '@/lib/http/route';
import { cancelReadout } from '@/lib/services/readouts/cancel-readout';

export const POST = route({
  access: 'lab',
  action: 'readout.cancel',
  summary: 'End a readout that waits or runs',
  params: idParamsSchema,
  returns: readoutSchema,
  handle: ({ ctx, params }) => cancelReadout(ctx, { readoutId: params.id }),
});
