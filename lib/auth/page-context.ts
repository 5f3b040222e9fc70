import { cookies, headers } from 'next/headers';
import { redirect } from 'next/navigation';
import { cache } from 'react';
import { v7 } from 'uuid';
import type { Ctx } from '@/lib/services/context';
import { readSession } from './read-session';
import { sessionCookieName } from './session-cookie';

/**
 * The context of a signed-in member for a server component; looked up once a request. Without a live session it
 * sends the browser to the sign-in page, which leads back.
 */
export const requirePageContext: () => Promise<Ctx> = cache(async () => {
  const [jar, head] = await Promise.all([cookies(), headers()]);
  const token = jar.get(sessionCookieName())?.value;
  const session = token === undefined ? null : await readSession(token);
  if (session === null) {
    const path = head.get('x-outfold-path') ?? '/';
    redirect(path === '/' ? '/sign-in' : `/sign-in?next=${encodeURIComponent(path)}`);
  }
  return {
    actor: session.actor,
    requestId: head.get('x-request-id') ?? v7(),
    signInId: session.signInId,
  };
});
