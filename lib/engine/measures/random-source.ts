/**
 * What the statistics need of a seeded generator; lib/engine/random provides it. All randomness is passed in, so the
 * same generator state gives the same numbers anywhere.
 */
export interface RandomSource {
  /** Uniform on [0, 1). */
  uniform(): number;
  /** Uniform whole number on 0 … maxExclusive − 1. */
  integer(maxExclusive: number): number;
  /** Standard normal. */
  normal(): number;
}
