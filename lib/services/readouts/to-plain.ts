type Plain = null | boolean | number | string | Plain[] | { [key: string]: Plain };

/**
 * A value as JSON holds it: typed arrays become arrays, absent parts go.
 * @throws Error with the path of a number that is NaN or infinite: those must never be stored as if they were absent
 */
export function toPlain(value: unknown, path = ''): Plain {
  if (value === null || typeof value === 'boolean' || typeof value === 'string') return value;
  if (typeof value === 'number') {
    if (!Number.isFinite(value)) throw new Error(`the number at ${path || 'the top'} is ${value}`);
    return value;
  }
  if (Array.isArray(value)) return value.map((item, at) => toPlain(item, `${path}/${at}`));
  if (ArrayBuffer.isView(value) && !(value instanceof DataView))
    return Array.from(value as unknown as ArrayLike<number>, (item, at) => toPlain(item, `${path}/${at}`));
  if (typeof value === 'object')
    return Object.fromEntries(
      Object.entries(value)
        .filter(([, item]) => item !== undefined)
        .map(([key, item]) => [key, toPlain(item, `${path}/${key}`)]),
    );
  throw new Error(`a ${typeof value} at ${path} cannot be stored`);
}
