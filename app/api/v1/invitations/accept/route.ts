import { z } from 'zod';
import { acceptInvitationSchema } from '@/lib/contracts/account';
import { route } from '@/lib/http/route';
import { acceptInvitation } from '@/lib/services/invitations/accept-invitation';

export const POST = route({
  access: 'public',
  action: null,
  summary: 'Accept an invitation by its link, with a new account or an existing one',
  body: acceptInvitationSchema,
  returns: z.strictObject({ email: z.string(), labName: z.string() }),
  handle: ({ body, requestId }) => acceptInvitation({ ...body, requestId }),
});
