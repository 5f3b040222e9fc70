import { db } from '@/db/connection';
import { findInvitationByLink } from '@/db/repositories/invitations';
import type { MailRow } from '@/db/repositories/mails';
import { findPasswordReset } from '@/db/repositories/password-resets';
import { findUser } from '@/db/repositories/users';
import { linkToken } from '@/lib/auth/link-token';
import { env } from '@/lib/env/env';
import { invitationMail } from '@/lib/mail/templates/invitation-mail';
import { passwordChangedMail } from '@/lib/mail/templates/password-changed-mail';
import { passwordResetMail } from '@/lib/mail/templates/password-reset-mail';

/**
 * A mail's text as of now; null where there is nothing left to say, because the invitation or reset is closed or over.
 * The secret of a link stands behind `#`, which browsers keep to themselves: no server log or referrer ever shows it.
 */
export async function composeMail(mail: MailRow): Promise<{ subject: string; text: string } | null> {
  const site = env().PUBLIC_URL;
  const { id } = mail.payload;
  if (mail.kind === 'invitation') {
    const row = await findInvitationByLink(db(), id);
    if (row === null || row.accepted_at !== null || row.revoked_at !== null || row.expires_at <= new Date())
      return null;
    return invitationMail({
      labName: row.lab_name,
      inviterName: row.inviter_name,
      role: row.role,
      link: `${site}/accept-invitation#${linkToken('invitation', id)}`,
      expiresAt: row.expires_at,
    });
  }
  if (mail.kind === 'password-reset') {
    const row = await findPasswordReset(db(), id);
    const user = row === null ? null : await findUser(db(), row.user_id);
    if (row === null || user === null || row.used_at !== null || row.expires_at <= new Date()) return null;
    return passwordResetMail({
      name: user.name,
      link: `${site}/new-password#${linkToken('password-reset', id)}`,
      expiresAt: row.expires_at,
    });
  }
  const user = await findUser(db(), id);
  if (user === null) return null;
  return passwordChangedMail({ name: user.name, forgottenLink: `${site}/forgotten-password` });
}
