/** The bucket holds no object (or no open upload) by that key, though the caller expected one. */
export class ObjectMissing extends Error {
  readonly key: string;

  constructor(key: string, options: { cause?: unknown } = {}) {
    super(`The object store holds nothing at ${key}`, options);
    this.name = 'ObjectMissing';
    this.key = key;
  }
}
