import type { CountsAxis } from '@/lib/contracts/intake';
import { IntakeRefusal } from '@/lib/intake/intake-refusal';
import { CountsBuilder } from '@/lib/intake/mapping/counts-builder';
import { scatterCells } from '@/lib/intake/mapping/scatter-cells';
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
  await scatterCells(
    array,
    axes.map((axis) => strideOf[axis]),
    (cell, value) => builder.set(cell, value),
  );
  return builder;
}
