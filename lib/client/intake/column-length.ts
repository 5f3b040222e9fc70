/** The length of an array that can be a column (n, n × 1 or 1 × n); null for any other shape. */
export function columnLength(shape: readonly number[]): number | null {
  if (shape.length === 0 || shape.length > 2) return null;
  if (shape.filter((length) => length !== 1).length > 1) return null;
  return shape.reduce((product, length) => product * length, 1);
}
