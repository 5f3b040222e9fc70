import { decode } from '@auth/core/jwt';
import { db } from '@/db/connection';
import { findSignedInMember, touchSignIn } from '@/db/repositories/sign-ins';
import { env } from '@/lib/env/env';
import type { Actor } from '@/lib/services/context';
import { sessionClaimsSchema, type SessionClaims } from './session-claims';
import { sessionCookieName } from './session-cookie';
import { sessionIdleMs, sessionMaxSeconds } from './session-times';

const touchEveryMs = 60_000;

/**
 * The member behind a session cookie's value, with the session's id; null where the token is forged, out of date,
 * ended, idle for too long, from before the last password change, or its membership is gone.
 */
export async function readSession(token: string): Promise<{ actor: Actor; signInId: string } | null> {
  const claims = await readClaims(token);
  if (claims === null) return null;
  const now = Date.now();
  if (now / 1000 - claims.signedInAt > sessionMaxSeconds) return null;
  const member = await findSignedInMember(db(), {
    signInId: claims.signInId,
    userId: claims.userId,
    idleSince: new Date(now - sessionIdleMs),
  });
  if (member === null || member.session_epoch !== claims.epoch) return null;
  if (now - member.last_seen_at.getTime() > touchEveryMs)
    await touchSignIn(db(), claims.signInId, new Date(now));
  return {
    signInId: claims.signInId,
    actor: {
      kind: 'member',
      userId: member.user_id,
      userName: member.user_name,
      email: member.email,
      labId: member.lab_id,
      labName: member.lab_name,
      role: member.role,
      scopes: null,
    },
  };
}

async function readClaims(token: string): Promise<SessionClaims | null> {
  try {
    const payload = await decode({ token, secret: env().AUTH_SECRET, salt: sessionCookieName() });
    const claims = sessionClaimsSchema.safeParse(payload?.claims);
    return claims.success ? claims.data : null;
  } catch {
    return null; // not one of our tokens, or past its time
  }
}
