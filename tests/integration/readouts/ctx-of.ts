import type { Ctx } from '@/lib/services/context';
import type { LabRows } from '@/tests/support/rows';

/** The context of a lab's member, as route() would make it. */
export function ctxOf(lab: LabRows): Ctx {
  const { userId, userName, email, labId, labName, role } = lab;
  return {
    actor: { kind: 'member', userId, userName, email, labId, labName, role, scopes: null },
    requestId: 'test',
  };
}
