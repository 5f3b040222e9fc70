import type { z } from 'zod';
import type { Action } from '@/lib/policy/actions';
import type { Ctx } from '@/lib/services/context';

/**
 * Who may call: `lab` a member by cookie or bearer token; `labOrBasic` also by HTTP Basic with email and password;
 * `signedIn` a member in a browser only, because no token may touch an account; `public` anybody.
 */
export type Access = 'lab' | 'labOrBasic' | 'signedIn' | 'public';
/** A schema for JSON, the raw web stream handed on, or no body at all. */
export type BodyKind = z.ZodType | 'stream' | 'none';
/** A schema for the DTO, or the content types of a Response that the verb makes itself. */
export type ReturnsKind = z.ZodType | { contentTypes: string[] };

export type ParsedBody<B extends BodyKind> = B extends z.ZodType
  ? z.output<B>
  : B extends 'stream'
    ? ReadableStream<Uint8Array> | null
    : undefined;

export interface HandleInput<A extends Access, P extends z.ZodType, Q extends z.ZodType, B extends BodyKind> {
  ctx: A extends 'public' ? null : Ctx;
  params: z.output<P>;
  query: z.output<Q>;
  body: ParsedBody<B>;
  request: Request;
  requestId: string;
  /** The version that If-Match names; 0 on routes that do not ask for one. */
  ifVersion: number;
}

export interface RouteDefinition<
  A extends Access = Access,
  P extends z.ZodType = z.ZodType,
  Q extends z.ZodType = z.ZodType,
  B extends BodyKind = BodyKind,
  R extends ReturnsKind = ReturnsKind,
> {
  access: A;
  /** What the verb will ask the policy for; null on public routes and on what every member may do. Documentation and tests read it. */
  action: Action | null;
  /** One line for the API document. */
  summary?: string;
  params?: P;
  query?: Q;
  body?: B;
  returns: R;
  /** Status of success; 200 where left out, 204 sends no body. */
  status?: number;
  /** Status of success where it depends on what is told; it wins over `status`. */
  statusOf?: (answer: R extends z.ZodType ? z.output<R> : never) => number;
  /** Cap on the body; 1 MiB where left out. A streamed body is only checked by its Content-Length here. */
  maxBytes?: number;
  /** The answer holds a secret that is shown once and must not be kept for replays. */
  secretAnswer?: boolean;
  /** The request must name the version it changes (If-Match). */
  requiresVersion?: boolean;
  handle(input: HandleInput<A, P, Q, B>): Promise<Response | Answer<R>> | Response;
}

/** What a verb hands back for a contract: its input side, or nothing where the contract is nothing. */
export type Answer<R extends ReturnsKind> = R extends z.ZodType
  ? undefined extends z.input<R>
    ? z.input<R> | void
    : z.input<R>
  : never;
