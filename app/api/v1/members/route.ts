import { z } from 'zod';
import { memberSchema } from '@/lib/contracts/account';
import { route } from '@/lib/http/route';
import { listMembers } from '@/lib/services/members/list-members';

export const GET = route({
  access: 'lab',
  action: 'member.read',
  summary: "The lab's members",
  returns: z.strictObject({ items: z.array(memberSchema) }),
  handle: ({ ctx }) => listMembers(ctx),
});
