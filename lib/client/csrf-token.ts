import { z } from 'zod';

/** The token that the account endpoints want back in a form; it is tied to a cookie that this call sets. */
export async function csrfToken(): Promise<string> {
  const response = await fetch('/api/auth/csrf', { credentials: 'same-origin', cache: 'no-store' });
  if (!response.ok) throw new Error(`The account service answered ${response.status}.`);
  return z.object({ csrfToken: z.string() }).parse(await response.json()).csrfToken;
}
