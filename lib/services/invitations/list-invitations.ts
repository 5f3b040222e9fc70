import { db } from '@/db/connection';
import { listInvitationRows } from '@/db/repositories/invitations';
import type { Invitation } from '@/lib/contracts/account';
import { authorize } from '@/lib/services/authorize';
import type { Ctx } from '@/lib/services/context';
import type { PageInput } from '@/lib/services/page-input';
import { pageOfRows } from '@/lib/services/page-of-rows';
import { toInvitation } from './to-invitation';

/** The lab's invitations, newest first, closed ones too. */
export async function listInvitations(
  ctx: Ctx,
  input: PageInput = {},
): Promise<{ items: Invitation[]; nextCursor: string | null }> {
  authorize(ctx, 'member.invite');
  const now = new Date();
  return pageOfRows(
    input,
    (beforeId, limit) => listInvitationRows(db(), ctx.actor.labId, beforeId, limit),
    (row) => toInvitation(row, now),
  );
}
