import type { InvitationRow } from '@/db/repositories/invitations';
import type { Invitation } from '@/lib/contracts/account';

export function toInvitation(row: InvitationRow & { inviter_name: string }, now: Date): Invitation {
  const state =
    row.accepted_at !== null
      ? 'accepted'
      : row.revoked_at !== null
        ? 'revoked'
        : row.expires_at <= now
          ? 'expired'
          : 'open';
  return {
    id: row.id,
    email: row.email,
    role: row.role,
    state,
    inviterName: row.inviter_name,
    createdAt: row.created_at.toISOString(),
    expiresAt: row.expires_at.toISOString(),
  };
}
