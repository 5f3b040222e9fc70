import { env } from '@/lib/env/env';
import { authConfig } from './auth-config';

/** Whether people reach the site over TLS. */
export function isSecureSite(): boolean {
  return (env().PUBLIC_URL ?? '').startsWith('https:');
}

/** The name of the session cookie; Auth.js also salts the key of the token with it. */
export function sessionCookieName(): string {
  return authConfig(isSecureSite()).cookies!.sessionToken!.name!;
}
