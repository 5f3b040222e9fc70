/** From the first index varying fastest to the last varying fastest. */
export function toRowMajor(values: Float64Array, shape: readonly number[]): Float64Array {
  const turned = new Float64Array(values.length);
  const strides = shape.map((_, axis) =>
    shape.slice(axis + 1).reduce((product, length) => product * length, 1),
  );
  const at = new Array<number>(shape.length).fill(0);
  let to = 0;
  for (const value of values) {
    turned[to] = value;
    for (let axis = 0; axis < shape.length; axis++) {
      to += strides[axis];
      if (++at[axis] < shape[axis]) break;
      to -= strides[axis] * shape[axis];
      at[axis] = 0;
    }
  }
  return turned;
}
