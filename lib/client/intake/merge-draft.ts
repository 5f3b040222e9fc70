import type { IntakeDraft } from '@/lib/client/intake/intake-draft';

/** A draft on top of which a member's own changes lie; arrays that were not touched follow the draft below. */
export function mergeDraft(proposed: IntakeDraft, changed: Partial<IntakeDraft>): IntakeDraft {
  return { ...proposed, ...changed, uses: { ...proposed.uses, ...changed.uses } };
}
