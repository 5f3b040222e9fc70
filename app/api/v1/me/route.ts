import { meSchema } from '@/lib/contracts/account';
import { route } from '@/lib/http/route';
import { getMe } from '@/lib/services/accounts/get-me';

export const GET = route({
  access: 'lab',
  action: null,
  summary: 'Who you are, in which lab, and what you may do',
  returns: meSchema,
  handle: ({ ctx }) => getMe(ctx),
});
