/** How long a reader may take for files of that size: two minutes, and a second more for each 4 MiB. */
export function readerSeconds(sizeBytes: number): number {
  return 120 + Math.ceil(sizeBytes / (4 * 1024 * 1024));
}
