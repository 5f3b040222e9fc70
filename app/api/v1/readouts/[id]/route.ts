import { idParamsSchema } from '@/lib/contracts/params';
import { readoutSchema } from '@/lib/contracts/readout';
import { route } from '@/lib/http/route';
import { getReadout } from '@/lib/services/readouts/get-readout';

export const GET = route({
  access: 'lab',
  action: 'readout.read',
  summary: 'One readout: its recipe, state, result and record',
  params: idParamsSchema,
  returns: readoutSchema,
  handle: ({ ctx, params }) => getReadout(ctx, { readoutId: params.id }),
});
