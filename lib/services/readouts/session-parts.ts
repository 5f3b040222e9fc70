import type { PartRecord } from '@/lib/intake/canonical/part-record';
import type { PartSource } from '@/lib/intake/canonical/part-source';
import { keys } from '@/storage/keys';
import { objectStore } from '@/storage/object-store';

/** The canonical data of one data version, read from the object store by ranges. */
export function sessionParts(data: {
  labId: string;
  sessionId: string;
  dataHash: string;
  parts: PartRecord[];
}): PartSource {
  return {
    parts: data.parts,
    read: (name, offset, length) =>
      objectStore().getRange(keys.dataPart(data.labId, data.sessionId, data.dataHash, name), offset, length),
  };
}
