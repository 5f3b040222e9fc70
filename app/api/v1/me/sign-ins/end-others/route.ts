import { z } from 'zod';
import { route } from '@/lib/http/route';
import { endOtherSignIns } from '@/lib/services/accounts/end-other-sign-ins';

export const POST = route({
  access: 'signedIn',
  action: null,
  summary: 'End all your browser sessions but this one',
  returns: z.strictObject({ ended: z.int().nonnegative() }),
  handle: ({ ctx }) => endOtherSignIns(ctx),
});
