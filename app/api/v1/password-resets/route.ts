import { z } from 'zod';
import { requestPasswordResetSchema } from '@/lib/contracts/account';
import { clientAddressOf } from '@/lib/http/client-address';
import { route } from '@/lib/http/route';
import { requestPasswordReset } from '@/lib/services/accounts/request-password-reset';

export const POST = route({
  access: 'public',
  action: null,
  summary: 'Send a link to set a new password, if the address has an account; the answer does not tell',
  body: requestPasswordResetSchema,
  returns: z.void(),
  status: 204,
  handle: ({ body, request, requestId }) =>
    requestPasswordReset({ ...body, address: clientAddressOf(request), requestId }),
});
