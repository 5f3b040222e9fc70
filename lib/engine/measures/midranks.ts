/**
 * Ranks 1…n; tied values share the mean of their ranks.
 *
 * Shapes: `values` n → n. Mutates nothing. Values must be finite (callers check). Cost: n log n.
 * Source: midranks, Lehmann, Nonparametrics 1975 (from memory).
 */
export function midranks(values: ArrayLike<number>): Float64Array {
  const n = values.length;
  const order = new Uint32Array(n);
  for (let i = 0; i < n; i += 1) order[i] = i;
  order.sort((a, b) => values[a] - values[b]);
  const ranks = new Float64Array(n);
  let start = 0;
  while (start < n) {
    let end = start;
    while (end + 1 < n && values[order[end + 1]] === values[order[start]]) end += 1;
    const rank = (start + end) / 2 + 1;
    for (let i = start; i <= end; i += 1) ranks[order[i]] = rank;
    start = end + 1;
  }
  return ranks;
}
