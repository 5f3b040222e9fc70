import { z } from 'zod';
import { idParamsSchema } from '@/lib/contracts/params';
import { route } from '@/lib/http/route';
import { endOwnSignIn } from '@/lib/services/accounts/end-own-sign-in';

export const DELETE = route({
  access: 'signedIn',
  action: null,
  summary: 'End one of your browser sessions',
  params: idParamsSchema,
  returns: z.void(),
  status: 204,
  handle: ({ ctx, params }) => endOwnSignIn(ctx, { signInId: params.id }),
});
