import { createTransport, type Transporter } from 'nodemailer';
import { env } from '@/lib/env/env';

const shared = globalThis as typeof globalThis & { outfoldMail?: { url: string; transport: Transporter } };

/** The one transport of this process, to the server of SMTP_URL. `verify()` tells whether it answers and takes our name. */
export function mailTransport(): Transporter {
  const url = env().SMTP_URL;
  if (shared.outfoldMail?.url !== url) {
    const { protocol, hostname, port, username, password } = new URL(url);
    const isSecure = protocol === 'smtps:';
    const isLoopback = ['127.0.0.1', 'localhost', '[::1]'].includes(hostname);
    shared.outfoldMail = {
      url,
      transport: createTransport({
        host: hostname.replace(/^\[|\]$/g, ''),
        port: Number(port || (isSecure ? 465 : 587)),
        secure: isSecure,
        // A password never goes over a network in the clear.
        requireTLS: !isSecure && !isLoopback && username !== '',
        ignoreTLS: isLoopback,
        ...(username
          ? { auth: { user: decodeURIComponent(username), pass: decodeURIComponent(password) } }
          : {}),
        connectionTimeout: 5_000,
        greetingTimeout: 5_000,
        socketTimeout: 20_000,
      }),
    };
  }
  return shared.outfoldMail.transport;
}
