/** A map from a data range to a pixel range. Pixel ranges may run downwards (a > b). */
export interface LinearScale {
  (value: number): number;
  /** Data value at a pixel. */
  invert(pixel: number): number;
  domain: readonly [number, number];
  range: readonly [number, number];
}

/** Linear scale from [d0, d1] to [r0, r1]; a domain without width maps to the middle of the range. */
export function linearScale(d0: number, d1: number, r0: number, r1: number): LinearScale {
  const span = d1 - d0;
  const scale = (value: number): number =>
    span === 0 ? (r0 + r1) / 2 : r0 + ((value - d0) / span) * (r1 - r0);
  const invert = (pixel: number): number => (r1 === r0 ? d0 : d0 + ((pixel - r0) / (r1 - r0)) * span);
  return Object.assign(scale, { invert, domain: [d0, d1] as const, range: [r0, r1] as const });
}
