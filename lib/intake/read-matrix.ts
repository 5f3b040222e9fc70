import { IntakeRefusal } from '@/lib/intake/intake-refusal';
import { scatterCells } from '@/lib/intake/mapping/scatter-cells';
import type { ReadableArray } from '@/lib/intake/readers/readable-file';

/** A matrix of indices, row-major. */
export interface IndexMatrix {
  nRows: number;
  nColumns: number;
  values: Int32Array;
}

/**
 * Reads a two-dimensional array of indices (whole numbers from 0). At most `maxEntries` of them.
 * @throws IntakeRefusal with the row and column where a value is no index
 */
export async function readMatrix(
  array: ReadableArray,
  fileName: string,
  maxEntries: number,
): Promise<IndexMatrix> {
  const place = { file: fileName, path: array.path };
  const [nRows, nColumns] = array.shape;
  if (array.shape.length !== 2 || array.dtype === 'string')
    throw new IntakeRefusal(
      'matrix-shape',
      `The array is ${array.shape.join(' × ')} of type ${array.dtype}; a matrix of whole numbers is needed.`,
      'Choose an array of two axes: one row a permutation, one column a trial that takes part.',
      place,
    );
  if (nRows * nColumns > maxEntries)
    throw new IntakeRefusal(
      'matrix-too-large',
      `The array has ${nRows} × ${nColumns} entries; ${maxEntries} can be taken at most.`,
      'Use fewer permutations.',
      place,
    );
  const values = new Int32Array(nRows * nColumns);
  await scatterCells(array, [nColumns, 1], (cell, value) => {
    if (!Number.isInteger(value) || value < 0 || value > 2_147_483_647)
      throw new IntakeRefusal(
        'matrix-value',
        `Row ${Math.floor(cell / nColumns)}, column ${cell % nColumns} holds ${value}, which is no index.`,
        'Indices are whole numbers from 0.',
        place,
      );
    values[cell] = value;
  });
  return { nRows, nColumns, values };
}
