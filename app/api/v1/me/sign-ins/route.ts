import { z } from 'zod';
import { signInSchema } from '@/lib/contracts/account';
import { route } from '@/lib/http/route';
import { listSignIns } from '@/lib/services/accounts/list-sign-ins';

export const GET = route({
  access: 'signedIn',
  action: null,
  summary: 'Your browser sessions that are open',
  returns: z.strictObject({ items: z.array(signInSchema) }),
  handle: ({ ctx }) => listSignIns(ctx),
});
