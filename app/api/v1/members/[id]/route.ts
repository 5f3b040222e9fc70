import { z } from 'zod';
import { changeMemberSchema } from '@/lib/contracts/account';
import { idParamsSchema } from '@/lib/contracts/params';
import { route } from '@/lib/http/route';
import { changeMember } from '@/lib/services/members/change-member';
import { removeMember } from '@/lib/services/members/remove-member';

export const PATCH = route({
  access: 'lab',
  action: 'member.change',
  summary: 'Give a member another role',
  params: idParamsSchema,
  body: changeMemberSchema,
  returns: z.void(),
  status: 204,
  handle: ({ ctx, params, body }) => changeMember(ctx, { userId: params.id, change: body }),
});

export const DELETE = route({
  access: 'lab',
  action: 'member.change',
  summary: 'End a membership; what the member did stays on record',
  params: idParamsSchema,
  returns: z.void(),
  status: 204,
  handle: ({ ctx, params }) => removeMember(ctx, { userId: params.id }),
});
