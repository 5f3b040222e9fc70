import type { Dtype } from '@/lib/intake/readers/readable-file';

/** Values of one array as they lie in the (inflated) bytes of their variable. */
export interface StoredValues {
  position: number;
  nBytes: number;
  storedType: number;
}

/** What a variable holds, without its numbers. */
export type MatNode =
  | { kind: 'numbers'; dtype: Dtype; shape: number[]; values: StoredValues }
  | { kind: 'text'; shape: number[]; text: string }
  | { kind: 'sparse'; shape: number[]; rows: StoredValues; columnStarts: StoredValues; values: StoredValues }
  | { kind: 'cell'; shape: number[]; items: MatNode[] }
  | { kind: 'struct'; shape: number[]; fields: Map<string, MatNode[]> }
  /** Objects, function handles and complex numbers: named and left aside. */
  | { kind: 'other'; what: string };
