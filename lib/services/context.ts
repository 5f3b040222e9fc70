import type { Role, Scope } from '@/lib/contracts/lab';

/** Who acts, in which lab, and with which rights. A `token` acts for its maker, within its scopes. */
export interface Actor {
  kind: 'member' | 'token' | 'system';
  userId: string;
  userName: string;
  email: string;
  labId: string;
  labName: string;
  role: Role;
  /** null for a member who is signed in: the role alone decides. */
  scopes: Scope[] | null;
}

/** What every verb is given first: the actor, and the id that ties its log lines and audit rows together. */
export interface Ctx {
  actor: Actor;
  requestId: string;
  /** The browser session that asks; missing for tokens and for the worker. */
  signInId?: string;
}
