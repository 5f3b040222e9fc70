import type { RandomGenerator } from 'pure-rand/types/RandomGenerator';
import { randomBinomial } from '@/lib/engine/random/random-binomial';
import { randomPoisson } from '@/lib/engine/random/random-poisson';

/**
 * Moves one trial's counts along a unit pattern by adding and thinning spikes, so that counts stay whole.
 *
 * Unit u's expected count in the window changes by amplitude·pattern[u]·√mean[u]·z, z the trial's label in standard
 * deviations; a rise adds Poisson spikes, a fall keeps each spike with probability 1 − fall/mean[u] (0 where that is
 * negative). Within the window the change follows the unit's mean counts over bins (`binMeans`, units × bins).
 *
 * `counts`: units × bins of the trial, overwritten. Cost O(spikes).
 */
export function injectSignal(
  counts: Int32Array,
  z: number,
  amplitude: number,
  pattern: Float64Array,
  binMeans: Float64Array,
  nBins: number,
  generator: RandomGenerator,
): void {
  for (let u = 0; u < pattern.length; u++) {
    let mean = 0;
    for (let b = 0; b < nBins; b++) mean += binMeans[u * nBins + b];
    if (mean === 0) continue;
    const change = amplitude * pattern[u] * Math.sqrt(mean) * z;
    const keep = Math.max(0, 1 + change / mean);
    for (let b = 0; b < nBins; b++) {
      const at = u * nBins + b;
      if (change >= 0) counts[at] += randomPoisson(generator, (change * binMeans[at]) / mean);
      else counts[at] = randomBinomial(generator, counts[at], keep);
    }
  }
}
