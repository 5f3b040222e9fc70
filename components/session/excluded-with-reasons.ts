import type { ExclusionList } from '@/lib/contracts/session';

/** The trials or units that are left out after all of a list's entries, each with the reason of its last entry. */
export function excludedWithReasons(
  list: ExclusionList,
  kind: 'trial' | 'unit',
): { index: number; reason: string; authorName: string; createdAt: string }[] {
  const left = new Map<number, { reason: string; authorName: string; createdAt: string }>();
  for (const item of [...list.items].sort((a, b) => a.version - b.version)) {
    if (item.kind !== kind) continue;
    for (const index of item.indices) {
      if (item.action === 'putBack') left.delete(index);
      else left.set(index, { reason: item.reason, authorName: item.authorName, createdAt: item.createdAt });
    }
  }
  return [...left].map(([index, entry]) => ({ index, ...entry })).sort((a, b) => a.index - b.index);
}
