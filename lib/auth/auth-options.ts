import { CredentialsSignin } from '@auth/core/errors';
import Credentials from '@auth/core/providers/credentials';
import type { AuthConfig } from '@auth/core';
import { z } from 'zod';
import { env } from '@/lib/env/env';
import { type AppError } from '@/lib/errors/app-error';
import { toAppError } from '@/lib/http/to-app-error';
import { log } from '@/lib/log/log';
import { authConfig } from './auth-config';
import { endSession } from './end-session';
import { sessionClaimsSchema } from './session-claims';
import { isSecureSite } from './session-cookie';
import { startSession } from './start-session';
import { verifyCredentials } from './verify-credentials';

const credentialsSchema = z.object({ email: z.string(), password: z.string() });

export interface SignInRequest {
  address: string;
  agent: string;
  requestId: string;
  /** Told of a failure that is not simply a wrong password, so that the answer can carry its status. */
  onFailure(error: AppError): void;
}

/** Auth.js with our accounts behind it, for one request. */
export function authOptions(request: SignInRequest): AuthConfig {
  const base = authConfig(isSecureSite());
  return {
    ...base,
    secret: env().AUTH_SECRET,
    providers: [
      Credentials({
        credentials: { email: {}, password: {} },
        authorize: async (given) => {
          const parsed = credentialsSchema.safeParse(given);
          if (!parsed.success) return null;
          try {
            const outcome = await verifyCredentials({ ...parsed.data, ...request });
            return outcome === null ? null : await startSession(outcome, request);
          } catch (error) {
            const problem = toAppError(error);
            if (problem.status >= 500)
              log.error({ err: error, requestId: request.requestId }, 'sign-in failed');
            request.onFailure(problem);
            throw Object.assign(new CredentialsSignin(), {
              code: problem.code === 'rate-limited' ? 'throttled' : 'unavailable',
            });
          }
        },
      }),
    ],
    callbacks: {
      jwt: ({ token, user }) =>
        user ? { ...token, claims: 'claims' in user ? user.claims : undefined } : token,
      session: ({ session }) => ({
        expires: session.expires,
        user: { name: session.user?.name ?? null, email: session.user?.email ?? null },
      }),
    },
    events: {
      signOut: async (message) => {
        const claims = 'token' in message ? sessionClaimsSchema.safeParse(message.token?.claims) : null;
        if (claims?.success) await endSession(claims.data, request.requestId);
      },
    },
    logger: {
      // Wrong passwords are in the audit trail; Auth.js's own lines would add stack traces to each of them.
      error: (error) => {
        if (!(error instanceof CredentialsSignin)) log.warn({ err: error }, 'account service');
      },
      warn: (code) => log.debug({ code }, 'account service'),
      debug: () => undefined,
    },
  };
}
