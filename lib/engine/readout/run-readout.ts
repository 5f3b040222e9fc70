import type { Linalg } from '@/lib/engine/linalg/port';
import { finishReadout } from '@/lib/engine/readout/finish-readout';
import { planReadout } from '@/lib/engine/readout/plan-readout';
import { runChunk } from '@/lib/engine/readout/run-chunk';
import type { ChunkCache, EngineProblem, ReadoutInput, ReadoutNumbers } from '@/lib/engine/readout/types';

/**
 * A whole readout in the calling thread: plan, every chunk in order, finish. For tests, scripts and small data; the
 * worker runs the same chunks on its threads. Returns the numbers, or the problems that stop it.
 */
export function runReadout(
  input: ReadoutInput,
  linalg: Linalg,
): { ok: true; numbers: ReadoutNumbers } | { ok: false; problems: EngineProblem[] } {
  const planned = planReadout(input);
  if (!planned.ok) return planned;
  const { plan } = planned;
  const kept = new Map<string, unknown>();
  const cache: ChunkCache = { get: (key) => kept.get(key), set: (key, value) => void kept.set(key, value) };
  const outputs = plan.chunks.map((chunk) => runChunk(input, plan, chunk, linalg, cache));
  return { ok: true, numbers: finishReadout(input, plan, outputs) };
}
