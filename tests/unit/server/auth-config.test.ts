import { describe, expect, it } from 'vitest';
import { authConfig } from '@/lib/auth/auth-config';

// RFC 6265bis, section 4.1.3.2: a cookie with the prefix __Host- is secure, has the path / and no domain.
describe('authConfig', () => {
  it('ties every cookie to this host over TLS', () => {
    for (const cookie of Object.values(authConfig(true).cookies ?? {})) {
      expect(cookie?.name).toMatch(/^__Host-outfold\./);
      expect(cookie?.options).toMatchObject({ secure: true, httpOnly: true, sameSite: 'lax', path: '/' });
      expect(cookie?.options).not.toHaveProperty('domain');
    }
  });

  it('does without TLS on loopback, still closed to scripts and to foreign forms', () => {
    for (const cookie of Object.values(authConfig(false).cookies ?? {})) {
      expect(cookie?.name).toMatch(/^outfold\./);
      expect(cookie?.options).toMatchObject({ secure: false, httpOnly: true, sameSite: 'lax', path: '/' });
    }
  });
});
