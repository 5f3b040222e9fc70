import type { PartRecord } from '@/lib/intake/canonical/part-record';

/** Where the parts of one data version are read from: an object store, or memory in tests. */
export interface PartSource {
  readonly parts: readonly PartRecord[];
  /** Exactly `length` bytes of part `name` from `offset`. */
  read(name: string, offset: number, length: number): Promise<Uint8Array>;
}
