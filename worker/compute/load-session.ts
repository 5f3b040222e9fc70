import { readCounts } from '@/lib/intake/canonical/read-counts';
import type { PartSource } from '@/lib/intake/canonical/part-source';
import type { CountsArray } from '@/lib/intake/counts-array';
import { loadSessionTables } from '@/lib/services/readouts/load-session-tables';
import { measureUnits } from '@/lib/services/readouts/measure-units';
import type { SessionTables } from '@/lib/services/readouts/session-tables';
import type { ComputeRequest } from '@/worker/compute/messages';

/** Tables of the session; rates of the units only where the recipe's unit rule looks at them. */
export async function loadTables(source: PartSource, request: ComputeRequest): Promise<SessionTables> {
  const tables = await loadSessionTables(source, request.shape);
  const { units } = request.recipe;
  const hasRateRule =
    'rule' in units && (units.rule.minRateHz !== undefined || units.rule.minPresence !== undefined);
  if (!hasRateRule) return tables;
  const { counts } = await readCounts(source);
  return { ...tables, unitFacts: measureUnits(counts, request.shape) };
}

/** The counts of the bins that are needed, in shared memory. */
export async function loadCounts(
  source: PartSource,
  bins: { binFrom: number; binTo: number },
): Promise<CountsArray> {
  const { counts } = await readCounts(source, bins);
  const buffer = new SharedArrayBuffer(counts.byteLength);
  if (counts instanceof Uint8Array) {
    const shared = new Uint8Array(buffer);
    shared.set(counts);
    return shared;
  }
  const shared = counts instanceof Uint16Array ? new Uint16Array(buffer) : new Int32Array(buffer);
  shared.set(counts);
  return shared;
}
