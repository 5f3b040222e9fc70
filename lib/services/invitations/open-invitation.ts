import type { Database } from '@/db/connection';
import { findInvitationByLink } from '@/db/repositories/invitations';
import { readLinkToken } from '@/lib/auth/link-token';
import { AppError } from '@/lib/errors/app-error';

/** The open invitation behind a link's token; one message for forged, used, revoked and outdated links. */
export async function openInvitation(
  q: Database,
  token: string,
): Promise<NonNullable<Awaited<ReturnType<typeof findInvitationByLink>>>> {
  const id = readLinkToken('invitation', token);
  const row = id === null ? null : await findInvitationByLink(q, id);
  if (row === null || row.accepted_at !== null || row.revoked_at !== null || row.expires_at <= new Date())
    throw new AppError(
      'not-found',
      'This invitation is not valid any more: it was used, taken back, replaced, or its seven days are over. Ask the lab for a new one.',
    );
  return row;
}
