import { encode } from '@auth/core/jwt';
import { v7 } from 'uuid';
import { db } from '@/db/connection';
import { hashPassword } from '@/lib/auth/hash-password';
import { sessionCookieName } from '@/lib/auth/session-cookie';
import { startSession } from '@/lib/auth/start-session';
import type { Role, Scope } from '@/lib/contracts/lab';
import type { HttpMethod } from '@/lib/http/openapi/registered-route';
import type { RouteHandler } from '@/lib/http/route';
import type { Actor } from '@/lib/services/context';
import { createToken } from '@/lib/services/tokens/create-token';
import type { LabRows } from '@/tests/support/rows';

export const origin = 'http://127.0.0.1:3000';
export const password = 'a-long-enough-pass-phrase';

export interface Call {
  method?: HttpMethod;
  path?: string;
  params?: Record<string, string>;
  headers?: Record<string, string>;
  /** Sent as JSON unless it is a string or bytes. */
  body?: unknown;
  cookie?: string;
  token?: string;
}

/** Calls a real route handler as Next would, over a Request of its own. */
export async function call(handler: RouteHandler, input: Call): Promise<Response> {
  const method = input.method ?? 'GET';
  const headers = new Headers({ host: '127.0.0.1:3000', ...input.headers });
  if (input.cookie !== undefined) {
    headers.set('cookie', input.cookie);
    if (method !== 'GET' && !headers.has('origin')) headers.set('origin', origin);
  }
  if (input.token !== undefined) headers.set('authorization', `Bearer ${input.token}`);
  let body: BodyInit | undefined;
  if (input.body !== undefined) {
    body =
      typeof input.body === 'string' || input.body instanceof Uint8Array
        ? (input.body as BodyInit)
        : JSON.stringify(input.body);
    if (!headers.has('content-type')) headers.set('content-type', 'application/json');
  }
  const request = new Request(`${origin}${input.path ?? '/api/v1/thing'}`, { method, headers, body });
  return handler(request, { params: Promise.resolve(input.params ?? {}) });
}

export function actorOf(member: LabRows, scopes: Scope[] | null = null): Actor {
  return {
    kind: scopes === null ? 'member' : 'token',
    userId: member.userId,
    userName: member.userName,
    email: member.email,
    labId: member.labId,
    labName: member.labName,
    role: member.role,
    scopes,
  };
}

/** A Cookie header of a live browser session. */
export async function cookieFor(member: LabRows, change: Record<string, unknown> = {}): Promise<string> {
  const user = await db()<{ id: string; session_epoch: number }>('users')
    .where({ id: member.userId })
    .first();
  const { claims } = await startSession(
    { actor: actorOf(member), epoch: user!.session_epoch },
    { address: '127.0.0.1', agent: 'test', requestId: v7() },
  );
  const name = sessionCookieName();
  const token = await encode({
    token: { sub: member.userId, claims: { ...claims, ...change } },
    secret: process.env.AUTH_SECRET!,
    salt: name,
  });
  return `${name}=${token}`;
}

/** A live bearer token of a member, made by the real verb. */
export async function tokenFor(member: LabRows, scopes: Scope[]): Promise<string> {
  const made = await createToken(
    { actor: actorOf(member), requestId: v7() },
    { name: 'test', scopes, expiresAt: new Date(Date.now() + 3_600_000).toISOString() },
  );
  return made.token;
}

export async function givePassword(member: { userId: string }): Promise<void> {
  await db()('users')
    .where({ id: member.userId })
    .update({ password_hash: await hashPassword(password) });
}

export async function addMember(lab: LabRows, role: Role): Promise<LabRows> {
  const { insertMember } = await import('@/tests/support/rows');
  return { ...lab, ...(await insertMember(lab.labId, role)) };
}

/** Gives a session made-up facts of a data version, as intake would leave them. */
export async function giveData(
  member: { labId: string; userId: string },
  sessionId: string,
  shape: { trials: number; units: number; bins: number },
): Promise<void> {
  const intakeId = v7();
  await db()('intakes').insert({
    id: intakeId,
    lab_id: member.labId,
    session_id: sessionId,
    mapping: '{}',
    state: 'done',
    problems: '[]',
    created_by: member.userId,
  });
  await db()('data_versions').insert({
    id: v7(),
    lab_id: member.labId,
    session_id: sessionId,
    intake_id: intakeId,
    number: 1,
    data_hash: 'a'.repeat(64),
    counts_hash: 'b'.repeat(64),
    n_trials: shape.trials,
    n_units: shape.units,
    n_bins: shape.bins,
    bin_width_ms: 20,
    window_start_ms: -40,
    parts: '[]',
    trial_columns: '[]',
    unit_columns: '[]',
    labels: '[]',
    problems: '[]',
    created_by: member.userId,
  });
  await db()('recording_sessions').where({ id: sessionId }).update({ state: 'ready' });
}
