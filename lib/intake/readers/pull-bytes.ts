/** Takes bytes from a stream piece by piece; gives null where the stream ends too early. */
export class PullBytes {
  readonly #slabs: AsyncIterator<Uint8Array>;
  #slab = new Uint8Array(0);
  #at = 0;
  #position = 0;

  constructor(slabs: AsyncIterable<Uint8Array>) {
    this.#slabs = slabs[Symbol.asyncIterator]();
  }

  /** Bytes taken or skipped so far. */
  get position(): number {
    return this.#position;
  }

  /** Exactly n bytes (a copy), or null. Only for small n: they are held. */
  async take(n: number): Promise<Uint8Array | null> {
    const bytes = new Uint8Array(n);
    let filled = 0;
    while (filled < n) {
      const part = await this.next(n - filled);
      if (part === null) return null;
      bytes.set(part, filled);
      filled += part.length;
    }
    return bytes;
  }

  /** Passes over n bytes; false where there are fewer. */
  async skip(n: number): Promise<boolean> {
    for (let left = n; left > 0;) {
      const part = await this.next(left);
      if (part === null) return false;
      left -= part.length;
    }
    return true;
  }

  /** The next piece of at most n bytes, as it comes; null at the end. */
  async next(n: number): Promise<Uint8Array | null> {
    while (this.#at === this.#slab.length) {
      const { done, value } = await this.#slabs.next();
      if (done) return null;
      this.#slab = new Uint8Array(value.buffer as ArrayBuffer, value.byteOffset, value.byteLength);
      this.#at = 0;
    }
    const part = this.#slab.subarray(this.#at, Math.min(this.#slab.length, this.#at + n));
    this.#at += part.length;
    this.#position += part.length;
    return part;
  }

  /** Ends the stream below. */
  async close(): Promise<void> {
    await this.#slabs.return?.();
  }
}
