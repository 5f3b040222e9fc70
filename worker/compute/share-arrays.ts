type TypedArray =
  Int8Array | Uint8Array | Int16Array | Uint16Array | Int32Array | Uint32Array | Float32Array | Float64Array;
type TypedArrayMaker = new (buffer: SharedArrayBuffer) => TypedArray;

/**
 * A copy of plain data whose typed arrays lie in shared memory, so that threads read one copy of them. Arrays that are
 * shared already, and the same array met twice, are not copied again.
 */
export function shareArrays<T>(value: T): T {
  const copies = new Map<TypedArray, TypedArray>();
  const walk = (item: unknown): unknown => {
    if (item === null || typeof item !== 'object') return item;
    if (ArrayBuffer.isView(item)) {
      const array = item as TypedArray;
      if (array.buffer instanceof SharedArrayBuffer) return array;
      let copy = copies.get(array);
      if (!copy) {
        copy = new (array.constructor as TypedArrayMaker)(new SharedArrayBuffer(array.byteLength));
        copy.set(array as Float64Array);
        copies.set(array, copy);
      }
      return copy;
    }
    if (Array.isArray(item)) return item.map(walk);
    return Object.fromEntries(Object.entries(item).map(([key, part]) => [key, walk(part)]));
  };
  return walk(value) as T;
}
