import type { CountsArray } from '@/lib/intake/counts-array';

/** The same counts in the narrowest of uint8, uint16 and int32 that holds them, so that equal counts give equal bytes. */
export function narrowCounts(counts: CountsArray): CountsArray {
  if (counts instanceof Uint8Array) return counts;
  let largest = 0;
  for (let cell = 0; cell < counts.length; cell++) if (counts[cell] > largest) largest = counts[cell];
  if (largest <= 0xff) return Uint8Array.from(counts);
  if (largest <= 0xffff) return counts instanceof Uint16Array ? counts : Uint16Array.from(counts);
  return counts;
}
