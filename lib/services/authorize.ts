import { AppError } from '@/lib/errors/app-error';
import type { Action } from '@/lib/policy/actions';
import { can } from '@/lib/policy/can';
import type { Ctx } from './context';

/**
 * Lets the actor's action pass or throws. A thing that is missing (`null`) or belongs to another lab answers
 * `not-found`, so that nobody learns which ids exist elsewhere; a role or scope that lacks the action answers
 * `forbidden`.
 */
export function authorize(ctx: Ctx, action: Action, resource?: { labId: string } | null): void {
  if (resource === null || (resource !== undefined && resource.labId !== ctx.actor.labId))
    throw new AppError('not-found', 'There is nothing at this address, or it is not in your lab.');
  if (can(ctx.actor, action, resource)) return;
  if (ctx.actor.scopes !== null && can({ ...ctx.actor, scopes: null }, action, resource))
    throw new AppError(
      'forbidden',
      `This token's scopes (${ctx.actor.scopes.join(', ')}) do not cover the action ${action}.`,
    );
  throw new AppError('forbidden', `The role ${ctx.actor.role} does not include the action ${action}.`);
}
