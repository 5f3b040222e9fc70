import { createHash } from 'node:crypto';
import { Int32, Schema, Table, makeVector, tableFromIPC, tableToIPC } from 'apache-arrow';

/** Permutations as one row-major matrix, a row a draw. */
export interface Permutations {
  nRows: number;
  nColumns: number;
  values: Int32Array;
}

/** The rows, as views into the matrix. */
export function permutationRows({ nRows, nColumns, values }: Permutations): Int32Array[] {
  return Array.from({ length: nRows }, (_, row) => values.subarray(row * nColumns, (row + 1) * nColumns));
}

/** Rows of one length as a matrix; null where their lengths differ. */
export function permutationMatrix(rows: readonly ArrayLike<number>[]): Permutations | null {
  const nColumns = rows[0]?.length ?? 0;
  if (rows.some((row) => row.length !== nColumns)) return null;
  const values = new Int32Array(rows.length * nColumns);
  rows.forEach((row, at) => values.set(row, at * nColumns));
  return { nRows: rows.length, nColumns, values };
}

/** SHA-256 (hex) over "<rows> <columns>\n" and the entries as little-endian int32, wherever they came from. */
export function hashPermutations({ nRows, nColumns, values }: Permutations): string {
  const hash = createHash('sha256').update(`${nRows} ${nColumns}\n`);
  // Every platform that Node 20 runs on is little-endian.
  return hash.update(new Uint8Array(values.buffer, values.byteOffset, values.byteLength)).digest('hex');
}

/** The permutations as they are kept in the object store: an Arrow IPC stream of one column, with the shape beside it. */
export function writePermutations({ nRows, nColumns, values }: Permutations): Uint8Array {
  const table = new Table({ index: makeVector({ data: values, type: new Int32() }) });
  const metadata = new Map([
    ['outfold.rows', String(nRows)],
    ['outfold.columns', String(nColumns)],
  ]);
  const schema = new Schema(table.schema.fields, metadata);
  return tableToIPC(new Table(schema, table.batches), 'stream');
}

/** The same permutations again. */
export function readPermutations(bytes: Uint8Array): Permutations {
  const table = tableFromIPC(bytes);
  const size = (name: string) => Number(table.schema.metadata.get(`outfold.${name}`));
  const values = table.getChild('index')?.toArray() as Int32Array | undefined;
  const matrix = { nRows: size('rows'), nColumns: size('columns'), values: values ?? new Int32Array(0) };
  if (matrix.values.length !== matrix.nRows * matrix.nColumns)
    throw new Error('kept permutations do not have the shape that they claim');
  return matrix;
}
