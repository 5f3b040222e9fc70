import { mailTransport } from '@/lib/mail/mail-transport';
import { AppError } from '@/lib/errors/app-error';
import { env } from '@/lib/env/env';

export interface Mail {
  /** One address; never a list, so that nobody sees who else was written to. */
  to: string;
  subject: string;
  text: string;
}

/**
 * Sends one plain-text mail. Resolves when the mail server has taken it.
 *
 * @throws AppError('unavailable') when the mail server is away or does not take it now; AppError('invalid-input') when
 *   it refuses the address
 */
export async function sendMail(mail: Mail): Promise<void> {
  try {
    await mailTransport().sendMail({
      from: env().MAIL_FROM,
      // As an object, so that commas and angle brackets in the text cannot add recipients.
      to: { name: '', address: mail.to },
      subject: mail.subject,
      text: mail.text,
      disableFileAccess: true,
      disableUrlAccess: true,
    });
  } catch (error) {
    const { responseCode, code } = error as { responseCode?: number; code?: string };
    if (code === 'EENVELOPE' && (responseCode === undefined || responseCode >= 500))
      throw new AppError('invalid-input', 'The mail server does not take this address.', { cause: error });
    throw new AppError('unavailable', 'The mail server cannot be reached. Try again shortly.', {
      cause: error,
      retryAfterSeconds: 30,
    });
  }
}
