/** How long part `number` (from 1) must be; null where the file has no such part. */
export function expectedPartBytes(
  file: { sizeBytes: number; partSizeBytes: number },
  number: number,
): number | null {
  const nParts = Math.ceil(file.sizeBytes / file.partSizeBytes);
  if (!Number.isInteger(number) || number < 1 || number > nParts) return null;
  return number < nParts ? file.partSizeBytes : file.sizeBytes - (nParts - 1) * file.partSizeBytes;
}
