import { randomInteger } from '@/lib/engine/random/random-integer';
import { randomNormal } from '@/lib/engine/random/random-normal';
import { randomPoisson } from '@/lib/engine/random/random-poisson';
import { randomUniform } from '@/lib/engine/random/random-uniform';
import { shuffle } from '@/lib/engine/random/shuffle';
import { splitGenerator } from '@/lib/engine/random/split-generator';

/** How the label runs over the session's trials. */
export type LabelDesign = 'independent' | 'blockBiased' | 'blockConstant' | 'autocorrelated' | 'trend';
export const labelDesigns: readonly LabelDesign[] = [
  'independent',
  'blockBiased',
  'blockConstant',
  'autocorrelated',
  'trend',
];

/** Size of every simulated null session: 12 blocks of 10 trials, 20 units. */
export const nullSize = { nTrials: 120, nUnits: 20, blockTrials: 10, nLevels: 5 };

/** A session whose units know nothing of the label. */
export interface NullSession {
  /** nTrials × nUnits spike counts. */
  counts: Int32Array;
  label: Float64Array;
  /** Block of each trial. */
  block: Int32Array;
}

/**
 * One simulated null session. Poisson units with rates of 2–10 spikes, a gain that all share on a trial (sd .2) and, with drift, a
 * random walk of each unit's log rate (steps of .05 a trial, so about 55 % over the session). `fresh` > 0: new trials of the same units.
 */
export function nullSession(design: LabelDesign, hasDrift: boolean, seed: number, fresh = 0): NullSession {
  const { nTrials, nUnits, blockTrials } = nullSize;
  const units = splitGenerator(seed, hasDrift ? 'null units, drift' : 'null units');
  const logRate = Float64Array.from({ length: nUnits }, () => Math.log(2 + 8 * randomUniform(units)));
  const counts = new Int32Array(nTrials * nUnits);
  const noise = fresh === 0 ? units : splitGenerator(seed, 'null units, fresh', fresh);
  for (let i = 0; i < nTrials; i += 1) {
    const gain = 0.2 * randomNormal(noise);
    for (let j = 0; j < nUnits; j += 1) {
      if (hasDrift) logRate[j] += 0.05 * randomNormal(noise);
      counts[i * nUnits + j] = randomPoisson(noise, Math.exp(logRate[j] + gain));
    }
  }
  return {
    counts,
    label: nullLabel(design, seed),
    block: Int32Array.from({ length: nTrials }, (_, i) => Math.floor(i / blockTrials)),
  };
}

function nullLabel(design: LabelDesign, seed: number): Float64Array {
  const { nTrials, blockTrials, nLevels } = nullSize;
  const random = splitGenerator(seed, `null label, ${design}`);
  const label = new Float64Array(nTrials);
  const balanced = (count: number): Float64Array => {
    const levels = Float64Array.from({ length: count }, (_, i) => (i % nLevels) / (nLevels - 1));
    shuffle(levels, random);
    return levels;
  };
  const blockLevel = balanced(nTrials / blockTrials);
  switch (design) {
    case 'independent':
      return balanced(nTrials);
    case 'blockConstant':
      return label.map((_, i) => blockLevel[Math.floor(i / blockTrials)]);
    case 'blockBiased':
      return label.map((_, i) =>
        randomUniform(random) < 0.5
          ? blockLevel[Math.floor(i / blockTrials)]
          : randomInteger(random, nLevels) / (nLevels - 1),
      );
    case 'autocorrelated': {
      let x = randomNormal(random);
      return label.map(() => {
        const now = x;
        x = 0.9 * x + Math.sqrt(1 - 0.81) * randomNormal(random);
        return now;
      });
    }
    case 'trend':
      return label.map((_, i) => i / nTrials + 0.3 * randomNormal(random));
  }
}
