import { db } from '@/db/connection';
import { findUserByEmail } from '@/db/repositories/users';
import type { InvitationLook } from '@/lib/contracts/account';
import { openInvitation } from './open-invitation';

/** What the holder of an invitation's link needs to know before accepting it. */
export async function lookAtInvitation(input: { token: string }): Promise<InvitationLook> {
  const row = await openInvitation(db(), input.token);
  return {
    email: row.email,
    role: row.role,
    labName: row.lab_name,
    inviterName: row.inviter_name,
    hasAccount: (await findUserByEmail(db(), row.email)) !== null,
  };
}
