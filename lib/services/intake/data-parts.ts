import type { DataVersionRow } from '@/db/repositories/data-versions';
import type { PartSource } from '@/lib/intake/canonical/part-source';
import { keys } from '@/storage/keys';
import { objectStore } from '@/storage/object-store';

/** The canonical parts of a data version, read from the object store by ranges. */
export function dataParts(
  version: Pick<DataVersionRow, 'lab_id' | 'session_id' | 'data_hash' | 'parts'>,
): PartSource {
  return {
    parts: version.parts,
    read: (name, offset, length) =>
      objectStore().getRange(
        keys.dataPart(version.lab_id, version.session_id, version.data_hash, name),
        offset,
        length,
      ),
  };
}
