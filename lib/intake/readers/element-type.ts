import type { Dtype } from '@/lib/intake/readers/readable-file';

/** How values of one type lie in bytes. */
export interface ElementType {
  dtype: Dtype;
  itemBytes: number;
  littleEndian: boolean;
  /** Only for dtype string: code points of 4 bytes (`U`) or single bytes (`S`), padded with zeros. */
  text?: 'U' | 'S';
}
