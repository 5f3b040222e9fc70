import type { Me } from '@/lib/contracts/account';
import { actions } from '@/lib/policy/actions';
import { can } from '@/lib/policy/can';
import type { Ctx } from '@/lib/services/context';

/** Who the caller is and what the policy lets them do. */
export async function getMe(ctx: Ctx): Promise<Me> {
  const { actor } = ctx;
  return {
    userId: actor.userId,
    name: actor.userName,
    email: actor.email,
    labId: actor.labId,
    labName: actor.labName,
    role: actor.role,
    scopes: actor.scopes,
    actions: actions.filter((action) => can(actor, action)),
  };
}
