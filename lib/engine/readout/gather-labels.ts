/** Columns `positions` of m label rows of length n, as m × positions.length. */
export function gatherLabels(rows: Float64Array, m: number, n: number, positions: Int32Array): Float64Array {
  const width = positions.length;
  const out = new Float64Array(m * width);
  for (let row = 0, at = 0; row < m; row++) {
    const from = row * n;
    for (let i = 0; i < width; i++, at++) out[at] = rows[from + positions[i]];
  }
  return out;
}
