import { db } from '@/db/connection';
import {
  leaseMails,
  markMailFailed,
  markMailSent,
  postponeMail,
  purgeMails,
  type MailRow,
} from '@/db/repositories/mails';
import { AppError } from '@/lib/errors/app-error';
import { log } from '@/lib/log/log';
import { sendMail } from '@/lib/mail/send-mail';
import { composeMail } from './compose-mail';

const leaseSeconds = 120;
const maxAttempts = 12;

/**
 * Sends the mails that are due. What the mail server does not take now is tried again, later each time, for about half
 * a day; an address that it refuses is given up. Several workers may send at once; after a crash between sending
 * and noting it, a mail goes out twice rather than never.
 */
export async function sendWaitingMails(limit = 20): Promise<void> {
  for (const mail of await leaseMails(db(), limit, leaseSeconds)) await sendOne(mail);
  await purgeMails(db());
}

async function sendOne(mail: MailRow): Promise<void> {
  try {
    const text = await composeMail(mail);
    if (text !== null) await sendMail({ to: mail.recipient, ...text });
    await markMailSent(db(), mail.id);
  } catch (error) {
    const isRefused = error instanceof AppError && error.code === 'invalid-input';
    log.warn(
      { err: error, mailId: mail.id, kind: mail.kind, attempts: mail.attempts + 1 },
      'a mail was not sent',
    );
    if (isRefused || mail.attempts + 1 >= maxAttempts) await markMailFailed(db(), mail.id);
    else await postponeMail(db(), mail.id);
  }
}
