import type { Centring } from '@/lib/engine/label/centring';
import type { StimulusShape } from '@/lib/engine/label/stimulus-shape';

/**
 * Lag-1 autocorrelation of a trial's velocities from frame to frame, pooled over locations and axes.
 *
 * φ = Σ x_t x_{t+1}/Σ x_t² · T/(T − 1), x what the centring leaves of the velocity; held within [−0.99, 0.99], so that
 * the effective degrees of freedom stay positive.
 * Shapes: as StimulusShape, from `offset` on. Mutates nothing. Returns 0 where nothing moves. Inputs are assumed checked.
 * Cost: two passes. Source: definition; T/(T − 1) makes up for the T − 1 products over T squares. Of three variants tried on
 * simulated motion this one's intervals came nearest to their level (see tests/reference/stats/realised-fraction.test.ts).
 */
export function frameAutocorrelation(
  velocity: ArrayLike<number>,
  offset: number,
  shape: StimulusShape,
  centring: Centring,
): number {
  const { nLocations, nAxes, nFrames } = shape;
  let squares = 0;
  let products = 0;
  for (let a = 0; a < nAxes; a += 1) {
    let axisMean = 0;
    for (let k = 0; k < nLocations; k += 1) axisMean += rowMean(velocity, offset, shape, k, a) / nLocations;
    for (let k = 0; k < nLocations; k += 1) {
      const start = offset + (k * nAxes + a) * nFrames;
      const own = centring === 'location' ? rowMean(velocity, offset, shape, k, a) : axisMean;
      const centre = centring === 'none' ? 0 : own;
      for (let t = 0; t < nFrames; t += 1) {
        const x = velocity[start + t] - centre;
        squares += x * x;
        if (t + 1 < nFrames) products += x * (velocity[start + t + 1] - centre);
      }
    }
  }
  if (!(squares > 0)) return 0;
  const phi = ((products / squares) * nFrames) / (nFrames - 1);
  return Math.max(-0.99, Math.min(0.99, phi));
}

function rowMean(
  velocity: ArrayLike<number>,
  offset: number,
  { nAxes, nFrames }: StimulusShape,
  location: number,
  axis: number,
): number {
  let sum = 0;
  const start = offset + (location * nAxes + axis) * nFrames;
  for (let t = 0; t < nFrames; t += 1) sum += velocity[start + t];
  return sum / nFrames;
}
