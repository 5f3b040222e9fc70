const MIB = 1024 * 1024;
const MAX_PARTS = 10_000;

/** Part size of an upload: 8 MiB, larger only where a file would need more than 10,000 parts (the S3 limit). */
export function partSizeFor(sizeBytes: number): number {
  return Math.max(8 * MIB, Math.ceil(sizeBytes / MAX_PARTS / MIB) * MIB);
}
