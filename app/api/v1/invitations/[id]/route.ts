import { z } from 'zod';
import { idParamsSchema } from '@/lib/contracts/params';
import { route } from '@/lib/http/route';
import { revokeInvitation } from '@/lib/services/invitations/revoke-invitation';

export const DELETE = route({
  access: 'lab',
  action: 'member.invite',
  summary: 'Take an open invitation back',
  params: idParamsSchema,
  returns: z.void(),
  status: 204,
  handle: ({ ctx, params }) => revokeInvitation(ctx, { invitationId: params.id }),
});
