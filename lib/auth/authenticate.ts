import { db } from '@/db/connection';
import { findLiveApiToken, touchApiToken } from '@/db/repositories/api-tokens';
import { AppError } from '@/lib/errors/app-error';
import { clientAddressOf } from '@/lib/http/client-address';
import { limitRate } from '@/lib/http/limit-rate';
import type { Ctx } from '@/lib/services/context';
import { hashToken } from './hash-token';
import { readSession } from './read-session';
import { sessionCookieName } from './session-cookie';
import { verifyCredentials } from './verify-credentials';

const badTokenBudget = { name: 'bad-token', points: 60, seconds: 60 };

/**
 * Who makes this request: by bearer token, where allowed by HTTP Basic, else by the session cookie. Throws
 * `unauthenticated` with one message, whatever was wrong.
 */
export async function authenticate(
  request: Request,
  requestId: string,
  allowed: { basic: boolean },
): Promise<Ctx> {
  const header = request.headers.get('authorization');
  if (header !== null) {
    const [scheme, value = ''] = header.split(/\s+/, 2);
    if (scheme.toLowerCase() === 'bearer') return byToken(request, value, requestId);
    if (scheme.toLowerCase() === 'basic' && allowed.basic) return byPassword(request, value, requestId);
    throw refused();
  }
  const cookie = cookieValue(request.headers.get('cookie'), sessionCookieName());
  const session = cookie === null ? null : await readSession(cookie);
  if (session === null) throw refused();
  return { actor: session.actor, requestId, signInId: session.signInId };
}

async function byToken(request: Request, token: string, requestId: string): Promise<Ctx> {
  const found = token.length > 200 ? null : await findLiveApiToken(db(), hashToken(token));
  if (found === null) {
    await limitRate(badTokenBudget, clientAddressOf(request));
    throw refused();
  }
  await touchApiToken(db(), found.token_id, new Date());
  return {
    requestId,
    actor: {
      kind: 'token',
      userId: found.user_id,
      userName: found.user_name,
      email: found.email,
      labId: found.lab_id,
      labName: found.lab_name,
      role: found.role,
      scopes: found.scopes,
    },
  };
}

async function byPassword(request: Request, value: string, requestId: string): Promise<Ctx> {
  const text = Buffer.from(value, 'base64').toString('utf8');
  const colon = text.indexOf(':');
  const outcome = await verifyCredentials({
    email: colon < 0 ? '' : text.slice(0, colon),
    password: colon < 0 ? '' : text.slice(colon + 1),
    address: clientAddressOf(request),
    requestId,
  });
  if (outcome === null) throw refused();
  return { actor: outcome.actor, requestId };
}

/** The named cookie's value in a Cookie header. */
function cookieValue(header: string | null, name: string): string | null {
  for (const part of header?.split(';') ?? []) {
    const equals = part.indexOf('=');
    if (equals > 0 && part.slice(0, equals).trim() === name) return part.slice(equals + 1).trim();
  }
  return null;
}

function refused(): AppError {
  return new AppError('unauthenticated', 'Sign in, or send a valid bearer token.');
}
