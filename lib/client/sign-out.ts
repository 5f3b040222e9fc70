import { csrfToken } from '@/lib/client/csrf-token';

/** Ends the session of this browser. */
export async function signOut(): Promise<void> {
  await fetch('/api/auth/signout', {
    method: 'POST',
    headers: { 'content-type': 'application/x-www-form-urlencoded', 'x-auth-return-redirect': '1' },
    body: new URLSearchParams({ csrfToken: await csrfToken(), callbackUrl: '/sign-in' }),
    credentials: 'same-origin',
  });
}
