import { z } from 'zod';
import { resetPasswordSchema } from '@/lib/contracts/account';
import { route } from '@/lib/http/route';
import { resetPassword } from '@/lib/services/accounts/reset-password';

export const POST = route({
  access: 'public',
  action: null,
  summary: 'Set a new password by a link from a mail; all browser sessions end',
  body: resetPasswordSchema,
  returns: z.void(),
  status: 204,
  handle: ({ body, requestId }) => resetPassword({ ...body, requestId }),
});
