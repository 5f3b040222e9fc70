/**
 * Throws `RangeError` when `array` is too short for a rows × cols matrix with leading dimension `ld`.
 * Guards both backends: a native call that runs past an array would corrupt memory.
 */
export function checkMatrix(
  name: string,
  array: Float64Array | Float32Array,
  rows: number,
  cols: number,
  ld: number,
): void {
  if (!Number.isInteger(rows) || !Number.isInteger(cols) || rows < 0 || cols < 0 || ld < cols) {
    throw new RangeError(`matrix ${name}: ${rows} × ${cols} with leading dimension ${ld} is not a matrix`);
  }
  if (rows > 0 && array.length < (rows - 1) * ld + cols) {
    throw new RangeError(
      `matrix ${name}: ${array.length} entries are too few for ${rows} × ${cols} (ld ${ld})`,
    );
  }
}
