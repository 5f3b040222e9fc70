import type { Linalg } from '@/lib/engine/linalg/port';
import { CollectedOutputs } from '@/lib/engine/readout/collected-outputs';
import { pooledR2 } from '@/lib/engine/readout/held-out-numbers';
import { nullNumbers } from '@/lib/engine/readout/null-numbers';
import { planReadout } from '@/lib/engine/readout/plan-readout';
import { runChunk } from '@/lib/engine/readout/run-chunk';
import type { ChunkCache, FoldsSpec, NullNumbers, NullSpec, ReadoutInput } from '@/lib/engine/readout/types';
import { type NullSession, nullSize } from '@/scripts/calibration/null-session';

export type NullFolds = 'stratified' | 'contiguous';
export type NullScheme = 'free' | 'within' | 'groups' | 'circularShift';

/** Draws of the shuffled control; at .05 the test is exact with 99. */
const DRAWS = 99;

/** The readout of a null session as the engine takes it. */
export function nullInput(
  session: NullSession,
  scheme: NullScheme,
  folds: NullFolds,
  seed: number,
): ReadoutInput {
  const { nTrials, nUnits } = nullSize;
  const nullScheme: NullSpec =
    scheme === 'within' || scheme === 'groups'
      ? { kind: scheme, codes: session.block, draws: DRAWS }
      : { kind: scheme, draws: DRAWS };
  const foldsSpec: FoldsSpec =
    folds === 'stratified'
      ? { kind: 'stratified', k: 5, repeats: 1 }
      : { kind: 'contiguous', k: 5, purgeTrials: 5 };
  return {
    counts: session.counts,
    nTrials,
    nUnits,
    nBins: 1,
    binWidthMs: 1000,
    windowStartMs: 0,
    y: session.label,
    labelName: 'label',
    trialIndex: Int32Array.from({ length: nTrials }, (_, i) => i),
    unitIndex: Int32Array.from({ length: nUnits }, (_, i) => i),
    window: { startMs: 0, endMs: 1000 },
    features: 'windowMean',
    transform: 'none',
    estimator: { kind: 'ridge', penalty: { choose: 'leaveOneOut' } },
    folds: foldsSpec,
    nuisance: { variables: [], handling: 'none' },
    nullScheme,
    controls: [],
    views: [],
    seed,
  };
}

/**
 * The shuffled control of the engine's readout of a simulated null session, whole pipeline in every draw. Intervals, which the test
 * does not need, are left out to save time. Returns null where the scheme has no second arrangement of these labels.
 */
export function runNullSession(
  session: NullSession,
  scheme: NullScheme,
  folds: NullFolds,
  seed: number,
  linalg: Linalg,
): NullNumbers | null {
  const input = nullInput(session, scheme, folds, seed);
  const planned = planReadout(input);
  if (!planned.ok) {
    if (scheme === 'within') return null;
    throw new Error(planned.problems.map((problem) => problem.message).join(' '));
  }
  const plan = { ...planned.plan, chunks: planned.plan.chunks.filter((chunk) => chunk.job.kind !== 'pair') };
  const kept = new Map<string, unknown>();
  const cache: ChunkCache = { get: (key) => kept.get(key), set: (key, value) => void kept.set(key, value) };
  const outputs = plan.chunks.map((chunk) => runChunk(input, plan, chunk, linalg, cache));
  const collected = new CollectedOutputs(plan, outputs);
  const observed = pooledR2(session.label, collected.predictions(0)[0]);
  return nullNumbers(scheme, observed, collected.nullR2(0), plan.logArrangements);
}
