import type { AuthConfig } from '@auth/core';
import { sessionMaxSeconds } from './session-times';

/**
 * Auth.js without the database: cookies, pages, lifetimes. Over TLS the cookies are `secure` and carry the prefix
 * `__Host-`, which ties them to this host and to the path `/`.
 *
 * @param secure whether the site is reached over https
 */
export function authConfig(secure: boolean): Omit<AuthConfig, 'providers'> {
  const options = { httpOnly: true, sameSite: 'lax' as const, path: '/', secure };
  const prefix = secure ? '__Host-' : '';
  return {
    basePath: '/api/auth',
    trustHost: true,
    useSecureCookies: secure,
    session: { strategy: 'jwt', maxAge: sessionMaxSeconds },
    pages: { signIn: '/sign-in', error: '/sign-in', signOut: '/sign-in' },
    cookies: {
      sessionToken: { name: `${prefix}outfold.session`, options },
      csrfToken: { name: `${prefix}outfold.csrf`, options },
      callbackUrl: { name: `${prefix}outfold.callback`, options },
    },
  };
}
