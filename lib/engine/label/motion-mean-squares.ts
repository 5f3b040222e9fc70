import type { Centring } from '@/lib/engine/label/centring';
import type { StimulusShape } from '@/lib/engine/label/stimulus-shape';

/** Mean squares between and within targets (frame × axis) of one trial. */
export interface MotionMeanSquares {
  between: number;
  within: number;
  dfBetween: number;
  dfWithin: number;
}

/**
 * One-way mean squares of a trial's velocities: frames × axes are the targets, the L locations repeated measures of each.
 *
 * With m[t,a] the mean of a target over locations:
 * between = L Σ (m − centre)² / df_b, within = Σ (v − m)² / df_w;
 * location: v less each location's mean on each axis; df A(T − 1) and (L − 1)A(T − 1);
 * axis: centre is the axis mean; df AT − A and (L − 1)AT;
 * none: centre 0; df AT and (L − 1)AT.
 * Shapes: `velocity` from `offset` on holds L·A·T finite numbers (see StimulusShape); deg/s → (deg/s)².
 * Mutates nothing. Shape and values are assumed checked. Cost: three passes.
 * Source: one-way random-effects analysis of variance, Shrout & Fleiss, Psychol. Bull. 1979.
 */
export function motionMeanSquares(
  velocity: ArrayLike<number>,
  offset: number,
  shape: StimulusShape,
  centring: Centring,
): MotionMeanSquares {
  const { nLocations, nAxes, nFrames } = shape;
  const means = new Float64Array(nLocations * nAxes);
  if (centring === 'location') {
    for (let r = 0; r < nLocations * nAxes; r += 1) {
      let sum = 0;
      for (let t = 0; t < nFrames; t += 1) sum += velocity[offset + r * nFrames + t];
      means[r] = sum / nFrames;
    }
  }
  let between = 0;
  let within = 0;
  for (let a = 0; a < nAxes; a += 1) {
    let centre = 0;
    if (centring === 'axis') {
      for (let k = 0; k < nLocations; k += 1) {
        for (let t = 0; t < nFrames; t += 1) centre += velocity[offset + (k * nAxes + a) * nFrames + t];
      }
      centre /= nLocations * nFrames;
    }
    for (let t = 0; t < nFrames; t += 1) {
      let target = 0;
      for (let k = 0; k < nLocations; k += 1) {
        const row = k * nAxes + a;
        target += velocity[offset + row * nFrames + t] - means[row];
      }
      target /= nLocations;
      between += nLocations * (target - centre) * (target - centre);
      for (let k = 0; k < nLocations; k += 1) {
        const row = k * nAxes + a;
        const rest = velocity[offset + row * nFrames + t] - means[row] - target;
        within += rest * rest;
      }
    }
  }
  const dfBetween = centring === 'none' ? nAxes * nFrames : nAxes * (nFrames - 1);
  const dfWithin = (nLocations - 1) * nAxes * (centring === 'location' ? nFrames - 1 : nFrames);
  return { between: between / dfBetween, within: within / dfWithin, dfBetween, dfWithin };
}
