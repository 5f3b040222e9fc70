import type { CountsAxis } from '@/lib/contracts/intake';
import { IntakeRefusal } from '@/lib/intake/intake-refusal';
import { CountsBuilder } from '@/lib/intake/mapping/counts-builder';
import type { ReadableArray } from '@/lib/intake/readers/readable-file';

/**
 * Reads an array of counts whose axes are named in the file's order (two axes: trials and units, one bin) into trials ×
 * units × bins. The array streams; only the counts themselves are held.
 */
export async function countsFromArray(
  array: ReadableArray,
  axes: readonly CountsAxis[],
  fileName: string,
): Promise<CountsBuilder> {
  const place = { file: fileName, path: array.path };
  const { shape } = array;
  if (array.dtype === 'string')
    throw new IntakeRefusal(
      'counts-not-numeric',
      'The array chosen as counts holds text.',
      'Choose an array of numbers.',
      place,
    );
  if (new Set(axes).size !== axes.length || !axes.includes('trial') || !axes.includes('unit'))
    throw new IntakeRefusal(
      'axes-named',
      `The axes are named ${axes.join(', ')}; trial and unit must be named once each, bin at most once.`,
      'Name each axis once.',
      place,
    );
  if (shape.length !== axes.length)
    throw new IntakeRefusal(
      'axes-number',
      `The array has ${shape.length} axes (${shape.join(' × ')}) and ${axes.length} are named.`,
      shape.length === 2
        ? 'Name two axes, trial and unit: such counts have one bin.'
        : 'Counts have the axes trial, unit and bin.',
      place,
    );
  const lengthOf = (axis: CountsAxis): number => (axes.includes(axis) ? shape[axes.indexOf(axis)] : 1);
  const [nTrials, nUnits, nBins] = [lengthOf('trial'), lengthOf('unit'), lengthOf('bin')];
  const builder = new CountsBuilder([nTrials, nUnits, nBins], place);
  const strideOf = { trial: nUnits * nBins, unit: nBins, bin: 1 };
  // Axes from the fastest in the file to the slowest.
  const order = array.order === 'C' ? [...axes.keys()].reverse() : [...axes.keys()];
  const lengths = order.map((axis) => shape[axis]);
  const strides = order.map((axis) => strideOf[axes[axis]]);
  const at = new Array<number>(order.length).fill(0);
  let cell = 0;
  for await (const chunk of array.chunks()) {
    for (let i = 0; i < chunk.length; i++) {
      builder.set(cell, Number(chunk[i]));
      cell += strides[0];
      if (++at[0] < lengths[0]) continue;
      for (let axis = 0; axis < order.length && at[axis] === lengths[axis]; axis++) {
        cell -= strides[axis] * lengths[axis];
        at[axis] = 0;
        if (axis + 1 < order.length) {
          at[axis + 1] += 1;
          cell += strides[axis + 1];
        }
      }
    }
  }
  return builder;
}
