import { z } from 'zod';
import { changePasswordSchema } from '@/lib/contracts/account';
import { route } from '@/lib/http/route';
import { changePassword } from '@/lib/services/accounts/change-password';

export const POST = route({
  access: 'signedIn',
  action: null,
  summary: 'Change your password; your other browser sessions end',
  body: changePasswordSchema,
  returns: z.void(),
  status: 204,
  handle: ({ ctx, body }) => changePassword(ctx, body),
});
