/** Lets at most `count` things happen at once; the rest wait in order. Shared by all uploads of a page. */
export class Slots {
  #free: number;
  readonly #waiting: (() => void)[] = [];

  constructor(count: number) {
    this.#free = count;
  }

  async run<T>(work: () => Promise<T>): Promise<T> {
    if (this.#free > 0) this.#free -= 1;
    else await new Promise<void>((resolve) => this.#waiting.push(resolve));
    try {
      return await work();
    } finally {
      const next = this.#waiting.shift();
      // a slot is handed on rather than freed, so that nobody can step in between
      if (next) next();
      else this.#free += 1;
    }
  }
}
