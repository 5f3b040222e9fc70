import { writeCanonicalTo, type CanonicalPart } from '@/lib/intake/canonical/write-canonical-to';
import type { SessionData } from '@/lib/intake/session-data';

/** The canonical form of a session with all its parts in memory; for small sessions, the demo generator and tests. */
export async function writeCanonical(
  data: SessionData,
): Promise<{ parts: CanonicalPart[]; dataHash: string; countsHash: string }> {
  const parts: CanonicalPart[] = [];
  const { dataHash, countsHash } = await writeCanonicalTo(data, (part) => {
    parts.push(part);
  });
  return { parts, dataHash, countsHash };
}
