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
