import type { Dtype } from '@/lib/intake/readers/readable-file';

/** What the header of an NPY array says, checked. */
export interface NpyHeader {
  dtype: Dtype;
  itemBytes: number;
  littleEndian: boolean;
  /** Only for dtype string: code points (`U`) or bytes (`S`). */
  text?: 'U' | 'S';
  order: 'C' | 'F';
  shape: number[];
  nValues: number;
  headerBytes: number;
  dataBytes: number;
}
