import type { Role, Scope } from '@/lib/contracts/lab';
import type { Action } from './actions';
import { roleActions } from './role-actions';
import { scopeActions } from './scope-actions';

interface Subject {
  kind: 'member' | 'token' | 'system';
  labId: string;
  role: Role;
  scopes: readonly Scope[] | null;
}

/**
 * Whether the actor may do this, to this thing if one is named. Pure: role and lab decide, and a token's scopes
 * narrow what its maker's role allows. The system (the worker) acts within one lab, whatever the role.
 */
export function can(actor: Subject, action: Action, resource?: { labId: string } | null): boolean {
  if (resource === null) return false;
  if (resource !== undefined && resource.labId !== actor.labId) return false;
  if (actor.kind === 'system') return true;
  if (!roleActions[actor.role].includes(action)) return false;
  return actor.scopes === null || actor.scopes.some((scope) => scopeActions[scope].includes(action));
}
