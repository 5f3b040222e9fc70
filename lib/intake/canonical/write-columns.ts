import {
  Field,
  Float64,
  RecordBatch,
  Schema,
  Struct,
  Table,
  Utf8,
  makeData,
  tableToIPC,
  type Data,
} from 'apache-arrow';
import type { Column } from '@/lib/intake/column';

/**
 * A table of columns as the bytes of an Arrow IPC file with one record batch. A column's type, and its period if it is
 * circular, stand in the field's metadata; missing values are nulls. The same columns give the same bytes.
 */
export function writeColumns(
  columns: readonly Column[],
  nRows: number,
  metadata: ReadonlyMap<string, string>,
  fieldMetadata: (column: Column) => Iterable<[string, string]> = () => [],
): Uint8Array {
  const fields: Field[] = [];
  const children: Data[] = [];
  for (const column of columns) {
    const meta = new Map<string, string>([['outfold.type', column.type], ...fieldMetadata(column)]);
    if (column.type === 'circular' && column.periodDeg !== undefined)
      meta.set('outfold.periodDeg', String(column.periodDeg));
    if (column.type === 'category') {
      fields.push(new Field(column.name, new Utf8(), true, meta));
      children.push(textData(column.values));
    } else {
      fields.push(new Field(column.name, new Float64(), true, meta));
      children.push(numberData(column.values));
    }
  }
  const schema = new Schema(fields, new Map(metadata));
  const struct = makeData({ type: new Struct(fields), length: nRows, nullCount: 0, children });
  return tableToIPC(new Table(schema, [new RecordBatch(schema, struct)]), 'file');
}

function numberData(values: Float64Array): Data<Float64> {
  const data = new Float64Array(values.length);
  const valid = new Uint8Array(Math.ceil(values.length / 8));
  let nullCount = 0;
  for (let row = 0; row < values.length; row++) {
    if (Number.isNaN(values[row])) nullCount += 1;
    else {
      data[row] = values[row];
      valid[row >> 3] |= 1 << (row & 7);
    }
  }
  const type = new Float64();
  return nullCount === 0
    ? makeData({ type, length: data.length, nullCount: 0, data })
    : makeData({ type, length: data.length, nullCount, nullBitmap: valid, data });
}

function textData(values: readonly (string | null)[]): Data<Utf8> {
  const encoded = values.map((value) => Buffer.from(value ?? '', 'utf8'));
  const valueOffsets = new Int32Array(values.length + 1);
  const valid = new Uint8Array(Math.ceil(values.length / 8));
  let nullCount = 0;
  for (let row = 0; row < values.length; row++) {
    valueOffsets[row + 1] = valueOffsets[row] + encoded[row].length;
    if (values[row] === null) nullCount += 1;
    else valid[row >> 3] |= 1 << (row & 7);
  }
  const data = new Uint8Array(Buffer.concat(encoded));
  const shared = { type: new Utf8(), length: values.length, nullCount, valueOffsets, data };
  return nullCount === 0 ? makeData(shared) : makeData({ ...shared, nullBitmap: valid });
}
