import { db } from '@/db/connection';
import { listReadoutLines, type ReadoutLine } from '@/db/repositories/readout-lists';
import { findSession } from '@/db/repositories/recording-sessions';
import type { ReadoutSummary } from '@/lib/contracts/readout';
import { decodeCursor, encodeCursor } from '@/lib/http/cursor';
import { authorize } from '@/lib/services/authorize';
import type { Ctx } from '@/lib/services/context';
import { notFound } from '@/lib/services/not-found';
import type { PageInput } from '@/lib/services/page-input';
import { recipeLine } from '@/lib/services/readouts/recipe-line';
import { statusLine } from '@/lib/services/readouts/status-line';

/** A session's attempt ledger, newest first: every readout ever tried on it, failed and cancelled ones too. */
export async function listReadouts(
  ctx: Ctx,
  input: PageInput & { sessionId: string },
): Promise<{ items: ReadoutSummary[]; nextCursor: string | null }> {
  authorize(ctx, 'readout.read');
  const { labId } = ctx.actor;
  if ((await findSession(db(), labId, input.sessionId)) === null) throw notFound();
  const limit = input.limit ?? 50;
  const start = decodeCursor(input.cursor, 1);
  const lines = await listReadoutLines(
    db(),
    labId,
    input.sessionId,
    start === null ? null : Number(start[0]),
    limit + 1,
  );
  const page = lines.slice(0, limit);
  const last = page.at(-1);
  return {
    items: page.map(toSummary),
    nextCursor: lines.length > limit && last ? encodeCursor([last.number]) : null,
  };
}

function toSummary(line: ReadoutLine): ReadoutSummary {
  const { nullLow, nullHigh } = line;
  return {
    id: line.id,
    number: line.number,
    state: line.state,
    label: line.recipe.label,
    recipeLine: recipeLine(line.recipe),
    r2: line.r2,
    r2Interval: line.r2Interval,
    nullInterval: nullLow === null || nullHigh === null ? null : { low: nullLow, high: nullHigh },
    p: line.p,
    verdictKind: line.verdictKind,
    statusLine: statusLine(line),
    dataVersion: line.dataVersion,
    authorName: line.authorName,
    createdAt: line.createdAt.toISOString(),
  };
}
