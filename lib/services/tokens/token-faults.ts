import type { CreateToken, Role, Scope } from '@/lib/contracts/lab';
import type { FieldFault } from '@/lib/errors/app-error';
import { roleScopes } from '@/lib/policy/role-scopes';

/** Rig computers run unattended for years; the page still proposes days. */
const longestMs = 5 * 366 * 24 * 60 * 60 * 1000;

/**
 * What is wrong with a wanted token: scopes beyond the maker's role, or beyond the token that asks; an end in the
 * past or more than five years away. Pure.
 */
export function tokenFaults(
  maker: { role: Role; scopes: readonly Scope[] | null },
  input: CreateToken,
  nowMs: number,
): FieldFault[] {
  const faults: FieldFault[] = [];
  for (const [position, scope] of input.scopes.entries()) {
    const pointer = `/scopes/${position}`;
    if (!roleScopes[maker.role].includes(scope))
      faults.push({
        pointer,
        code: 'beyond-role',
        detail: `the role ${maker.role} cannot give the scope ${scope}`,
      });
    else if (maker.scopes !== null && !maker.scopes.includes(scope))
      faults.push({
        pointer,
        code: 'beyond-token',
        detail: `this token does not hold the scope ${scope} itself`,
      });
  }
  const expiresMs = Date.parse(input.expiresAt);
  if (expiresMs <= nowMs)
    faults.push({ pointer: '/expiresAt', code: 'out-of-range', detail: 'the end lies in the past' });
  else if (expiresMs > nowMs + longestMs)
    faults.push({
      pointer: '/expiresAt',
      code: 'out-of-range',
      detail: 'a token lives for five years at most',
    });
  return faults;
}
