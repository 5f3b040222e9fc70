import { inTransaction } from '@/db/transaction';
import { writeAudit } from '@/lib/audit/write-audit';
import { log } from '@/lib/log/log';
import type { Ctx } from '@/lib/services/context';
import { limitRate } from './limit-rate';

/** A member who hammers a closed door fills a log, not the audit trail. */
const budget = { name: 'refusals', points: 30, seconds: 60 };

/** Notes in the audit trail that a member was refused. Never throws: the refusal itself stands either way. */
export async function recordRefusal(ctx: Ctx, request: Request, detail: string): Promise<void> {
  try {
    await limitRate(budget, ctx.actor.userId);
    await inTransaction((trx) =>
      writeAudit(trx, ctx, {
        action: 'request.refused',
        subjectKind: 'route',
        subjectId: request.method,
        detail: {
          path: new URL(request.url).pathname.slice(0, 300),
          by: ctx.actor.kind,
          role: ctx.actor.role,
          reason: detail.slice(0, 300),
        },
      }),
    );
  } catch (error) {
    log.warn({ err: error, requestId: ctx.requestId }, 'a refusal is not in the audit trail');
  }
}
