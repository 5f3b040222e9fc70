import type { ReadableArray } from '@/lib/intake/readers/readable-file';

/**
 * Streams an array's values to their places in a row-major target: `put(cell, value)` for each, where a step along axis i
 * of the array moves the cell by `strides[i]`. Works for both storage orders; nothing but the present chunk is held.
 */
export async function scatterCells(
  array: Pick<ReadableArray, 'shape' | 'order' | 'chunks'>,
  strides: readonly number[],
  put: (cell: number, value: number) => void,
): Promise<void> {
  // Axes from the fastest in the file to the slowest.
  const axes = [...array.shape.keys()];
  const order = array.order === 'C' ? axes.reverse() : axes;
  const lengths = order.map((axis) => array.shape[axis]);
  const steps = order.map((axis) => strides[axis]);
  const at = new Array<number>(order.length).fill(0);
  let cell = 0;
  for await (const chunk of array.chunks()) {
    for (let i = 0; i < chunk.length; i++) {
      put(cell, Number(chunk[i]));
      cell += steps[0];
      if (++at[0] < lengths[0]) continue;
      for (let axis = 0; axis < order.length && at[axis] === lengths[axis]; axis++) {
        cell -= steps[axis] * lengths[axis];
        at[axis] = 0;
        if (axis + 1 < order.length) {
          at[axis + 1] += 1;
          cell += steps[axis + 1];
        }
      }
    }
  }
}
