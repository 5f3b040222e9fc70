import type { FileFormat } from '@/lib/contracts/file';
import type { Problem } from '@/lib/contracts/problem';

export type Dtype =
  | 'bool'
  | 'int8'
  | 'uint8'
  | 'int16'
  | 'uint16'
  | 'int32'
  | 'uint32'
  | 'int64'
  | 'uint64'
  | 'float16'
  | 'float32'
  | 'float64'
  | 'string';

/** Consecutive values of one array; float16 arrives as Float32Array, bool as 0 and 1. */
export type NumberChunk =
  | Int8Array
  | Uint8Array
  | Int16Array
  | Uint16Array
  | Int32Array
  | Uint32Array
  | BigInt64Array
  | BigUint64Array
  | Float32Array
  | Float64Array;
export type ValueChunk = NumberChunk | string[];

/** One array of a file: its facts, and its values as a stream in the order in which they are stored. */
export interface ReadableArray {
  path: string;
  dtype: Dtype;
  shape: number[];
  /** C: the last index varies fastest; F: the first. */
  order: 'C' | 'F';
  chunks(): AsyncIterable<ValueChunk>;
}

/** One row of a text table, with the line (from 1) on which it starts. */
export interface TableRow {
  cells: string[];
  line: number;
}

/** A table of text rows under one header; `rows` parses the file again, in batches. */
export interface ReadableTable {
  header: string[];
  nRows: number;
  rows(): AsyncIterable<TableRow[]>;
}

/** A file that has been recognised and whose structure has been checked. */
export interface ReadableFile {
  format: FileFormat;
  arrays: ReadableArray[];
  table?: ReadableTable;
  problems: Problem[];
  /** Frees what the reader holds; safe to call twice. */
  close(): void;
}
