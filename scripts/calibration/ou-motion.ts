import type { RandomSource } from '@/lib/engine/measures/random-source';

/** Settings of simulated Ornstein–Uhlenbeck motion. */
export interface OuMotion {
  fraction: number;
  nLocations: number;
  nAxes: number;
  nFrames: number;
  frameS: number;
  tauS: number;
  /** Standard deviation of a constant velocity that all locations of a trial share, in units of the motion's own. */
  driftSd: number;
}

/**
 * One trial's velocities (location × axis × frame): √f·shared + √(1 − f)·own, each a stationary unit-variance
 * Ornstein–Uhlenbeck process sampled exactly (Gillespie, Phys. Rev. E 1996), plus a common constant drift.
 */
export function ouMotion(random: RandomSource, motion: OuMotion): Float64Array {
  const { fraction, nLocations, nAxes, nFrames, frameS, tauS, driftSd } = motion;
  const phi = Math.exp(-frameS / tauS);
  const innovation = Math.sqrt(1 - phi * phi);
  const trace = (): Float64Array => {
    const x = new Float64Array(nFrames);
    x[0] = random.normal();
    for (let t = 1; t < nFrames; t += 1) x[t] = phi * x[t - 1] + innovation * random.normal();
    return x;
  };
  const out = new Float64Array(nLocations * nAxes * nFrames);
  for (let a = 0; a < nAxes; a += 1) {
    const shared = trace();
    const drift = driftSd * random.normal();
    for (let k = 0; k < nLocations; k += 1) {
      const own = trace();
      for (let t = 0; t < nFrames; t += 1) {
        out[(k * nAxes + a) * nFrames + t] =
          Math.sqrt(fraction) * shared[t] + Math.sqrt(1 - fraction) * own[t] + drift;
      }
    }
  }
  return out;
}
