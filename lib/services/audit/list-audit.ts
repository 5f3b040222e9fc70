import { db } from '@/db/connection';
import { listAuditEntries } from '@/db/repositories/audit-entries';
import type { AuditEntry } from '@/lib/contracts/audit';
import { decodeCursor, encodeCursor } from '@/lib/http/cursor';
import { authorize } from '@/lib/services/authorize';
import type { Ctx } from '@/lib/services/context';
import type { PageInput } from '@/lib/services/page-input';

/** The lab's audit trail, newest first. */
export async function listAudit(
  ctx: Ctx,
  input: PageInput = {},
): Promise<{ items: AuditEntry[]; nextCursor: string | null }> {
  authorize(ctx, 'audit.read');
  const limit = input.limit ?? 50;
  const start = decodeCursor(input.cursor, 1);
  const rows = await listAuditEntries(
    db(),
    ctx.actor.labId,
    start === null ? null : Number(start[0]),
    limit + 1,
  );
  const page = rows.slice(0, limit);
  const last = page.at(-1);
  return {
    items: page.map((row) => ({
      id: Number(row.id),
      action: row.action,
      subjectKind: row.subject_kind,
      subjectId: row.subject_id,
      detail: row.detail as Record<string, unknown>,
      actorId: row.actor_id,
      actorName: row.actor_name,
      requestId: row.request_id,
      createdAt: row.created_at.toISOString(),
      hash: row.hash,
    })),
    nextCursor: rows.length > limit && last !== undefined ? encodeCursor([Number(last.id)]) : null,
  };
}
