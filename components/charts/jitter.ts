/** A fixed sideways offset in −0.5…0.5 for trial `index`, the same on every drawing of it. Layout only, no statistic. */
export function jitter(index: number): number {
  return ((index * 7919) % 101) / 101 - 0.5;
}
