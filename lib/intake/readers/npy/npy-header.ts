import type { ElementType } from '@/lib/intake/readers/element-type';

/** What the header of an NPY array says, checked. */
export interface NpyHeader extends ElementType {
  order: 'C' | 'F';
  shape: number[];
  nValues: number;
  headerBytes: number;
  dataBytes: number;
}
