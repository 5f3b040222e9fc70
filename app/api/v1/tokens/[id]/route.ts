import { z } from 'zod';
import { idParamsSchema } from '@/lib/contracts/params';
import { route } from '@/lib/http/route';
import { revokeToken } from '@/lib/services/tokens/revoke-token';

export const DELETE = route({
  access: 'lab',
  action: 'token.revoke',
  summary: 'Revoke one of your own tokens',
  params: idParamsSchema,
  returns: z.void(),
  status: 204,
  handle: ({ ctx, params }) => revokeToken(ctx, { tokenId: params.id }),
});
