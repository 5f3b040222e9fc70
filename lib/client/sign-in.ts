import { csrfToken } from '@/lib/client/csrf-token';

/** How a sign-in ended. `message` is a sentence for the form. */
export type SignInOutcome = { isSignedIn: true } | { isSignedIn: false; message: string };

const away = 'The service did not answer. Nothing was sent; try again in a moment.';

/** Signs in with mail address and password. Never throws: every ending has its sentence. */
export async function signIn(email: string, password: string): Promise<SignInOutcome> {
  let response: Response;
  try {
    response = await fetch('/api/auth/callback/credentials', {
      method: 'POST',
      headers: { 'content-type': 'application/x-www-form-urlencoded', 'x-auth-return-redirect': '1' },
      body: new URLSearchParams({ csrfToken: await csrfToken(), email, password, callbackUrl: '/' }),
      credentials: 'same-origin',
      cache: 'no-store',
    });
  } catch {
    return { isSignedIn: false, message: away };
  }
  if (response.status === 429) {
    const seconds = Number(response.headers.get('retry-after'));
    const wait =
      seconds > 0
        ? `Wait ${Math.ceil(seconds / 60)} min and try again.`
        : 'Wait a few minutes and try again.';
    return { isSignedIn: false, message: `Too many attempts. ${wait}` };
  }
  if (response.status >= 500) {
    return {
      isSignedIn: false,
      message: 'The account service is away. Nothing is wrong with your password; try again in a moment.',
    };
  }
  const body: unknown = await response.json().catch(() => null);
  const url =
    body && typeof body === 'object' && 'url' in body && typeof body.url === 'string' ? body.url : '';
  const failure = url ? new URL(url, window.location.origin).searchParams.get('error') : null;
  if (response.ok && !failure) return { isSignedIn: true };
  if (response.status === 401 || failure === 'CredentialsSignin') {
    return {
      isSignedIn: false,
      message: 'This mail address and password do not go together. Check both; the password minds capitals.',
    };
  }
  return {
    isSignedIn: false,
    message: `The sign-in was refused (${failure ?? response.status}). Reload the page and try again.`,
  };
}
