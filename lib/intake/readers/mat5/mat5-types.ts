import type { Dtype } from '@/lib/intake/readers/readable-file';

/** Types of stored values (“mi” types of the format). */
export const storedTypes: Readonly<
  Record<number, { dtype: Exclude<Dtype, 'bool' | 'string' | 'float16'>; itemBytes: number }>
> = {
  1: { dtype: 'int8', itemBytes: 1 },
  2: { dtype: 'uint8', itemBytes: 1 },
  3: { dtype: 'int16', itemBytes: 2 },
  4: { dtype: 'uint16', itemBytes: 2 },
  5: { dtype: 'int32', itemBytes: 4 },
  6: { dtype: 'uint32', itemBytes: 4 },
  7: { dtype: 'float32', itemBytes: 4 },
  9: { dtype: 'float64', itemBytes: 8 },
  12: { dtype: 'int64', itemBytes: 8 },
  13: { dtype: 'uint64', itemBytes: 8 },
  16: { dtype: 'uint8', itemBytes: 1 }, // UTF-8 text
  17: { dtype: 'uint16', itemBytes: 2 }, // UTF-16 text
};

/** Numeric array classes (“mx” classes): the type that the values have, in however narrow a type they are stored. */
export const numericClasses: Readonly<Record<number, Dtype>> = {
  6: 'float64',
  7: 'float32',
  8: 'int8',
  9: 'uint8',
  10: 'int16',
  11: 'uint16',
  12: 'int32',
  13: 'uint32',
  14: 'int64',
  15: 'uint64',
};

export const mxCell = 1;
export const mxStruct = 2;
export const mxChar = 4;
export const mxSparse = 5;
export const miMatrix = 14;
export const miCompressed = 15;
