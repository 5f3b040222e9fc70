import { createInvitationSchema, invitationSchema } from '@/lib/contracts/account';
import { pageOf, pageQuerySchema } from '@/lib/contracts/common';
import { route } from '@/lib/http/route';
import { createInvitation } from '@/lib/services/invitations/create-invitation';
import { listInvitations } from '@/lib/services/invitations/list-invitations';

export const GET = route({
  access: 'lab',
  action: 'member.invite',
  summary: "The lab's invitations, newest first",
  query: pageQuerySchema,
  returns: pageOf(invitationSchema),
  handle: ({ ctx, query }) => listInvitations(ctx, query),
});

export const POST = route({
  access: 'lab',
  action: 'member.invite',
  summary: 'Invite an address to the lab; a mail brings the link',
  body: createInvitationSchema,
  returns: invitationSchema,
  status: 201,
  handle: ({ ctx, body }) => createInvitation(ctx, body),
});
