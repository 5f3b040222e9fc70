import type { Metadata } from 'h5wasm';
import type { ElementType } from '@/lib/intake/readers/element-type';

const INTEGER = 0;
const FLOAT = 1;
const ENUM = 8;

/**
 * How one number of a dataset (or of a compound's member) lies in memory; null for types that are no numbers. The library
 * turns values to this machine's byte order, whatever the file's.
 */
export function datasetType(
  metadata: Pick<Metadata, 'type' | 'size' | 'signed' | 'enum_type'>,
): ElementType | null {
  const { type, size: itemBytes, signed } = metadata;
  const number = (dtype: ElementType['dtype']): ElementType => ({ dtype, itemBytes, littleEndian: true });
  if (type === ENUM) {
    const members = metadata.enum_type?.members ?? {};
    return itemBytes === 1 && members.FALSE === 0 && members.TRUE === 1 ? number('bool') : null;
  }
  if (type === FLOAT && (itemBytes === 2 || itemBytes === 4 || itemBytes === 8))
    return number(itemBytes === 2 ? 'float16' : itemBytes === 4 ? 'float32' : 'float64');
  if (type === INTEGER && (itemBytes === 1 || itemBytes === 2 || itemBytes === 4 || itemBytes === 8)) {
    const bits = (itemBytes * 8) as 8 | 16 | 32 | 64;
    return number(signed ? `int${bits}` : `uint${bits}`);
  }
  return null;
}
