import { uniformFloat64 } from 'pure-rand/distribution/uniformFloat64';
import { uniformInt } from 'pure-rand/distribution/uniformInt';
import { xoroshiro128plus } from 'pure-rand/generator/xoroshiro128plus';

/** Seeded random draws for made-up recordings. Every method advances the same stream. */
export class Draws {
  private readonly generator;
  private spareNormal: number | null = null;

  constructor(seed: number) {
    this.generator = xoroshiro128plus(seed);
  }

  /** Uniform on (0, 1): never exactly 0, so that a logarithm of it is finite. */
  uniform(): number {
    return uniformFloat64(this.generator) || Number.MIN_VALUE;
  }

  between(low: number, high: number): number {
    return low + (high - low) * this.uniform();
  }

  integer(maxExclusive: number): number {
    return uniformInt(this.generator, 0, maxExclusive - 1);
  }

  /** Standard normal by the polar method (Marsaglia & Bray, SIAM Review 1964). */
  normal(mean = 0, sd = 1): number {
    if (this.spareNormal !== null) {
      const spare = this.spareNormal;
      this.spareNormal = null;
      return mean + sd * spare;
    }
    for (;;) {
      const u = 2 * this.uniform() - 1;
      const v = 2 * this.uniform() - 1;
      const s = u * u + v * v;
      if (s >= 1 || s === 0) continue;
      const scale = Math.sqrt((-2 * Math.log(s)) / s);
      this.spareNormal = v * scale;
      return mean + sd * u * scale;
    }
  }

  /** Gamma with the given shape (≥ 1) and scale (Marsaglia & Tsang, ACM TOMS 2000). */
  gamma(shape: number, scale = 1): number {
    const d = shape - 1 / 3;
    const c = 1 / Math.sqrt(9 * d);
    for (;;) {
      const x = this.normal();
      const v = (1 + c * x) ** 3;
      if (v > 0 && Math.log(this.uniform()) < 0.5 * x * x + d - d * v + d * Math.log(v)) return d * v * scale;
    }
  }

  /** Poisson by multiplication of uniforms (Knuth); the means here are spikes in one bin, so well below 30. */
  poisson(mean: number): number {
    const limit = Math.exp(-mean);
    let product = this.uniform();
    let count = 0;
    while (product > limit) {
      product *= this.uniform();
      count += 1;
    }
    return count;
  }

  shuffle<T>(items: T[]): T[] {
    for (let i = items.length - 1; i > 0; i--) {
      const j = this.integer(i + 1);
      [items[i], items[j]] = [items[j], items[i]];
    }
    return items;
  }
}
