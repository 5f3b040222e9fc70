import { randomSubset } from '@/lib/engine/random/random-subset';
import { splitGenerator } from '@/lib/engine/random/split-generator';
import type { FeatureSpec } from '@/lib/engine/readout/types';

/**
 * The session's units (ascending) that a feature set uses: all included ones, one of them (`one` indexes the
 * included units), or a random subset that depends on the seed and its stream alone.
 */
export function chooseUnits(units: FeatureSpec['units'], unitIndex: Int32Array, seed: number): Int32Array {
  if ('all' in units) return unitIndex;
  if ('one' in units) return unitIndex.slice(units.one, units.one + 1);
  const { size, stream } = units.subset;
  return randomSubset(unitIndex.length, size, splitGenerator(seed, 'units', stream)).map(
    (at) => unitIndex[at],
  );
}
