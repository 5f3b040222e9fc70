/** One part of a file: its number from 1, and its half-open range of octets. */
export interface PartRange {
  number: number;
  from: number;
  to: number;
}

/** Cuts a file into parts of `partSizeBytes`, the last one shorter. An empty file has none. */
export function partRanges(sizeBytes: number, partSizeBytes: number): PartRange[] {
  const nParts = Math.ceil(sizeBytes / partSizeBytes);
  return Array.from({ length: nParts }, (_, index) => ({
    number: index + 1,
    from: index * partSizeBytes,
    to: Math.min(sizeBytes, (index + 1) * partSizeBytes),
  }));
}
