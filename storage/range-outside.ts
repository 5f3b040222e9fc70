/** A range was asked for that the object does not hold. */
export class RangeOutside extends Error {
  readonly key: string;

  constructor(key: string, offset: number, length: number, options: { cause?: unknown } = {}) {
    super(`The object at ${key} does not hold ${length} bytes from byte ${offset}`, options);
    this.name = 'RangeOutside';
    this.key = key;
  }
}
