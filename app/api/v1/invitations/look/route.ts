import { invitationLookSchema, readInvitationSchema } from '@/lib/contracts/account';
import { route } from '@/lib/http/route';
import { lookAtInvitation } from '@/lib/services/invitations/look-at-invitation';

export const POST = route({
  access: 'public',
  action: null,
  summary: 'What an invitation is about, for the holder of its link',
  body: readInvitationSchema,
  returns: invitationLookSchema,
  handle: ({ body }) => lookAtInvitation(body),
});
