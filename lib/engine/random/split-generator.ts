import { xoroshiro128plusFromState } from 'pure-rand/generator/xoroshiro128plus';
import type { RandomGenerator } from 'pure-rand/types/RandomGenerator';

/** One round of the 32-bit finaliser of MurmurHash3 (A. Appleby, public domain). */
function mix(h: number): number {
  h ^= h >>> 16;
  h = Math.imul(h, 0x85ebca6b);
  h ^= h >>> 13;
  h = Math.imul(h, 0xc2b2ae35);
  return h ^ (h >>> 16);
}

function absorb(lane: number, word: number): number {
  return mix(Math.imul(lane ^ word, 0x9e3779b1) + 0x7f4a7c15) | 0;
}

/**
 * The generator of one stream of randomness, told apart by a seed, a purpose and any number of indices.
 *
 * Each of four 32-bit lanes absorbs seed, purpose and indices by a mixing hash; the 128 bits start a
 * xoroshiro128+ (Blackman & Vigna 2018, by pure-rand). Streams with different arguments are independent for
 * all practical purposes, so that folds, draws and subsets can be made anywhere and in any order.
 *
 * `seed` 0…2³²−1; `purpose` a short literal; `indices` integers. Nothing passed in is changed. Cost O(arguments).
 */
export function splitGenerator(seed: number, purpose: string, ...indices: number[]): RandomGenerator {
  const lanes: number[] = [0x243f6a88, 0x85a308d3, 0x13198a2e, 0x03707344]; // fractional digits of pi: arbitrary, unequal
  const words = [seed | 0, purpose.length];
  for (let i = 0; i < purpose.length; i++) words.push(purpose.charCodeAt(i));
  for (const index of indices) words.push(index | 0, 0x55555555);
  const state: number[] = lanes.map((lane) => words.reduce<number>(absorb, lane));
  if (!state.some((word) => word !== 0)) state[0] = 1; // the all-zero state is the generator's one fixed point
  const generator = xoroshiro128plusFromState(state);
  for (let i = 0; i < 4; i++) generator.next();
  return generator;
}
