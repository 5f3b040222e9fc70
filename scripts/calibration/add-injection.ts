import { injectSignal } from '@/lib/engine/controls/inject-signal';
import type { Linalg } from '@/lib/engine/linalg/port';
import { randomNormal } from '@/lib/engine/random/random-normal';
import { splitGenerator } from '@/lib/engine/random/split-generator';
import { planReadout } from '@/lib/engine/readout/plan-readout';
import { runChunk } from '@/lib/engine/readout/run-chunk';
import type { ChunkCache } from '@/lib/engine/readout/types';
import type { InjectionCell } from '@/scripts/calibration/cells';
import { nullSession, nullSize } from '@/scripts/calibration/null-session';
import type { Add } from '@/scripts/calibration/tally';
import { nullInput, runNullSession } from '@/scripts/calibration/run-null-session';

/** Sessions that the control makes for its power at each size. */
const DRAWS = 10;

/**
 * One session: the injection control's stated power at each size, and whether a fresh session of the same units with a signal of that
 * size (the control's own amplitude and unit pattern) is found.
 */
export function addInjection(cell: InjectionCell, seed: number, linalg: Linalg, add: Add): void {
  const { nTrials, nUnits } = nullSize;
  const session = nullSession('independent', false, seed);
  const input = {
    ...nullInput(session, 'free', 'stratified', seed),
    controls: [{ kind: 'injection' as const, sizes: cell.sizes, draws: DRAWS }],
  };
  const planned = planReadout(input);
  if (!planned.ok) throw new Error(planned.problems.map((problem) => problem.message).join(' '));
  const { plan } = planned;
  const kept = new Map<string, unknown>();
  const cache: ChunkCache = { get: (key) => kept.get(key), set: (key, value) => void kept.set(key, value) };
  const amplitudes = new Map<number, number>();
  for (const chunk of plan.chunks) {
    if (chunk.job.kind !== 'injection') continue;
    const { values } = runChunk(input, plan, chunk, linalg, cache);
    const size = cell.sizes[chunk.job.size];
    const p = (Number(values.exceedances) + 1) / (Number(values.draws) + 1);
    add(`${size} stated`, p <= 0.05 ? 1 / DRAWS : 0);
    amplitudes.set(size, Number(values.amplitude));
  }
  // The control's own pattern over units and its mean counts.
  const generator = splitGenerator(seed, 'pattern');
  const pattern = Float64Array.from({ length: nUnits }, () => randomNormal(generator));
  const means = new Float64Array(nUnits);
  session.counts.forEach((count, at) => (means[at % nUnits] += count / nTrials));
  cell.sizes.forEach((size, s) => {
    const fresh = nullSession('independent', false, seed, s + 1);
    const { label } = nullSession('independent', false, seed + 1_000_000 * (s + 1));
    const mean = label.reduce((sum, y) => sum + y, 0) / nTrials;
    const sd = Math.sqrt(label.reduce((sum, y) => sum + (y - mean) ** 2, 0) / nTrials);
    const random = splitGenerator(seed, 'fresh signal', s);
    for (let i = 0; i < nTrials; i += 1) {
      const trial = fresh.counts.subarray(i * nUnits, (i + 1) * nUnits);
      injectSignal(trial, (label[i] - mean) / sd, amplitudes.get(size) ?? 0, pattern, means, 1, random);
    }
    const found = runNullSession({ ...fresh, label }, 'free', 'stratified', seed, linalg);
    add(`${size} found`, found?.p !== null && found !== null && found.p <= 0.05 ? 1 : 0);
  });
}
