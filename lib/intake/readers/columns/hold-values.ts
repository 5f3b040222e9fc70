import type { Dtype } from '@/lib/intake/readers/readable-file';
import type { HeldColumn } from '@/lib/intake/readers/columns/column-file';

/**
 * Values of any scalar kind as a column: numbers where all that are there are numbers (or bigints, or booleans), text where
 * all are text; null where they are mixed or nested.
 */
export function holdValues(name: string, values: readonly unknown[]): HeldColumn | null {
  const present = values.filter((value) => value !== null && value !== undefined);
  const isAll = (...types: string[]): boolean => present.every((value) => types.includes(typeof value));
  if (present.length > 0 && isAll('string'))
    return {
      name,
      dtype: 'string',
      values: values.map((value) => (typeof value === 'string' ? value : null)),
    };
  if (!isAll('number', 'bigint', 'boolean')) return null;
  const numbers = Float64Array.from(values, (value) =>
    value === null || value === undefined ? NaN : Number(value),
  );
  const dtype: Dtype =
    present.length > 0 && isAll('boolean')
      ? 'bool'
      : present.length === values.length && numbers.every((value) => Number.isSafeInteger(value))
        ? 'int64'
        : 'float64';
  return { name, dtype, values: numbers };
}
