/** Writes an array's shape: 640 × 128 × 60; "one value" for a scalar. */
export function formatShape(shape: readonly number[]): string {
  return shape.length === 0 ? 'one value' : shape.join('\u00a0×\u00a0');
}
