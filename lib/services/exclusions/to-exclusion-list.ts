import type { ExclusionRow } from '@/db/repositories/exclusions';
import type { ExclusionList } from '@/lib/contracts/session';
import { applyExclusions } from './apply-exclusions';

/** The list as a member sees it, from a session's entries in order. */
export function toExclusionList(rows: (ExclusionRow & { author_name: string })[]): ExclusionList {
  const { trials, units } = applyExclusions(rows);
  return {
    version: rows.at(-1)?.version ?? 0,
    items: rows.map((row) => ({
      version: row.version,
      action: row.action,
      kind: row.kind,
      indices: row.indices,
      reason: row.reason,
      authorId: row.author_id,
      authorName: row.author_name,
      createdAt: row.created_at.toISOString(),
    })),
    excludedTrials: trials,
    excludedUnits: units,
  };
}
