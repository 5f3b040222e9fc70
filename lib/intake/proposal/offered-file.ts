import type { ArrayFact, FileFormat } from '@/lib/contracts/file';

/** A readable file as far as its facts go: what a proposal is made from. */
export interface OfferedFile {
  fileId: string;
  name: string;
  format: FileFormat;
  arrays: ArrayFact[];
}

/** One array with the file that it is in. */
export interface OfferedArray extends ArrayFact {
  fileId: string;
  fileName: string;
  format: FileFormat;
}

/** Whether a file of that format is one table, whose columns go together. */
export function isTable(format: FileFormat): boolean {
  return format === 'csv' || format === 'arrow' || format === 'parquet' || format === 'json';
}
