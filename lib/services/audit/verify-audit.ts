import { verifyAuditChain } from '@/lib/audit/verify-audit-chain';
import type { AuditVerification } from '@/lib/contracts/audit';
import { limitRate } from '@/lib/http/limit-rate';
import { authorize } from '@/lib/services/authorize';
import type { Ctx } from '@/lib/services/context';

/** Working a long chain out again takes a while, so not more often than needed. */
const budget = { name: 'audit-verification', points: 60, seconds: 60 };

/** Works the lab's audit chain out again. `headHash` is worth writing down elsewhere: a later chain must contain it. */
export async function verifyAudit(ctx: Ctx): Promise<AuditVerification> {
  authorize(ctx, 'audit.read');
  await limitRate(budget, ctx.actor.labId);
  const { entries, faults, headHash } = await verifyAuditChain(ctx.actor.labId);
  return { holds: faults.length === 0, entries, headHash, faults: faults.slice(0, 100) };
}
