import type { DataVersionRow } from '@/db/repositories/data-versions';
import { readCounts } from '@/lib/intake/canonical/read-counts';
import { deriveFacts, type DerivedFacts } from '@/lib/intake/derive-facts';
import { dataParts } from '@/lib/services/intake/data-parts';

const MAX_KEPT = 24;
const kept = new Map<string, Promise<DerivedFacts>>();

/**
 * Rates, presence, Fano factors and trial totals of a data version. They follow from the counts alone, so the last few are
 * kept by the hash of the data.
 */
export function derivedFactsOf(version: DataVersionRow): Promise<DerivedFacts> {
  const key = version.data_hash;
  const known = kept.get(key);
  if (known !== undefined) {
    kept.delete(key);
    kept.set(key, known);
    return known;
  }
  const working = work(version);
  kept.set(key, working);
  working.catch(() => kept.delete(key));
  if (kept.size > MAX_KEPT) kept.delete(kept.keys().next().value!);
  return working;
}

async function work(version: DataVersionRow): Promise<DerivedFacts> {
  const { counts, shape } = await readCounts(dataParts(version));
  const [nTrials, nUnits, nBins] = shape;
  return deriveFacts({ counts, nTrials, nUnits, nBins, binWidthMs: version.bin_width_ms });
}
