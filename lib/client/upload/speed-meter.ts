const windowMs = 10_000;
const leastMs = 1_500;

/** Measures how fast octets leave over the last ten seconds. Says nothing until it has watched long enough to be honest. */
export class SpeedMeter {
  readonly #now: () => number;
  #samples: { atMs: number; bytes: number }[] = [];

  constructor(now: () => number) {
    this.#now = now;
  }

  /** Starts anew, as after a pause. */
  reset(bytes: number): void {
    this.#samples = [{ atMs: this.#now(), bytes }];
  }

  record(bytes: number): void {
    const atMs = this.#now();
    this.#samples.push({ atMs, bytes });
    while (this.#samples.length > 2 && this.#samples[1].atMs < atMs - windowMs) this.#samples.shift();
  }

  get bytesPerSecond(): number | null {
    const first = this.#samples.at(0);
    const last = this.#samples.at(-1);
    if (!first || !last || last.atMs - first.atMs < leastMs || last.bytes <= first.bytes) return null;
    return ((last.bytes - first.bytes) / (last.atMs - first.atMs)) * 1000;
  }

  secondsLeft(bytesLeft: number): number | null {
    const speed = this.bytesPerSecond;
    return speed === null ? null : bytesLeft / speed;
  }
}
