import { db } from '@/db/connection';
import { listLabMembers } from '@/db/repositories/memberships';
import type { Member } from '@/lib/contracts/account';
import { authorize } from '@/lib/services/authorize';
import type { Ctx } from '@/lib/services/context';

/** The lab's members, the oldest membership first. */
export async function listMembers(ctx: Ctx): Promise<{ items: Member[] }> {
  authorize(ctx, 'member.read');
  const rows = await listLabMembers(db(), ctx.actor.labId);
  return {
    items: rows.map((row) => ({
      userId: row.user_id,
      name: row.user_name,
      email: row.email,
      role: row.role,
      joinedAt: row.joined_at.toISOString(),
    })),
  };
}
