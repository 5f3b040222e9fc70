/**
 * k blocks of consecutive trials, sizes differing by at most one (the first n mod k blocks are the larger ones).
 * Returns each position's fold, ascending. Cost O(n).
 */
export function contiguousFolds(n: number, k: number): Int32Array {
  const foldOf = new Int32Array(n);
  const small = Math.floor(n / k);
  const nLarge = n % k;
  let at = 0;
  for (let fold = 0; fold < k; fold++) {
    const size = small + (fold < nLarge ? 1 : 0);
    foldOf.fill(fold, at, at + size);
    at += size;
  }
  return foldOf;
}
