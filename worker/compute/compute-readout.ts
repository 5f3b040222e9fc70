import type { Problem } from '@/lib/contracts/problem';
import { finishReadout } from '@/lib/engine/readout/finish-readout';
import { planReadout } from '@/lib/engine/readout/plan-readout';
import type { ChunkOutput, ReadoutInput, ReadoutPlan } from '@/lib/engine/readout/types';
import { engineVersion } from '@/lib/engine/version';
import { labelTrends } from '@/lib/services/readouts/label-trends';
import { writePredictions } from '@/lib/services/readouts/predictions-table';
import { recipeProblems } from '@/lib/services/readouts/recipe-problems';
import { resolveRecipe } from '@/lib/services/readouts/resolve-recipe';
import { sessionParts } from '@/lib/services/readouts/session-parts';
import { keys } from '@/storage/keys';
import { objectStore } from '@/storage/object-store';
import { ComputeFault } from '@/worker/compute/compute-fault';
import { decodeOutput, encodeOutput } from '@/worker/compute/encode-output';
import { libraryVersions } from '@/worker/compute/library-versions';
import { loadNullInputs } from '@/worker/compute/load-null-inputs';
import { loadCounts, loadTables } from '@/worker/compute/load-session';
import { memoryProblem } from '@/worker/compute/memory-problem';
import type { ComputeRequest, FromChild } from '@/worker/compute/messages';
import { problemFrom } from '@/worker/compute/problem-from';
import { progressMeter } from '@/worker/compute/progress-meter';
import { runChunks, type ThreadPool } from '@/worker/compute/run-chunks';
import { shareArrays } from '@/worker/compute/share-arrays';
import { partsFor, splitChunks } from '@/worker/compute/split-chunks';

const progressEveryMs = 250;
/** What one thread may keep of intermediate results, whatever the limit on memory. */
const maxCacheBytes = 512 * 2 ** 20;

/** Loads, resolves, plans, computes and finishes one readout, and tells how it goes. */
export async function computeReadout(
  request: ComputeRequest,
  pool: ThreadPool,
  send: (message: FromChild) => Promise<void>,
): Promise<void> {
  await send({
    kind: 'progress',
    progress: { done: 0, total: 1_000, phase: 'Reading the data', secondsLeft: null },
  });
  const source = sessionParts(request);
  const [tables, inputs] = await Promise.all([loadTables(source, request), loadNullInputs(request)]);
  const { excludedTrials, excludedUnits } = request;
  const resolution = resolveRecipe(request.recipe, tables, { excludedTrials, excludedUnits, ...inputs });
  if ('faults' in resolution) return send({ kind: 'problems', problems: recipeProblems(resolution.faults) });
  const { resolved } = resolution;
  const { binFrom, binTo } = resolved.bins;
  const bytesPerCount = source.parts.find(({ counts }) => counts)?.counts?.bytesPerCount ?? 4;
  const countBytes = tables.nTrials * tables.nUnits * (binTo - binFrom) * bytesPerCount;
  // Twice: what is read is copied into shared memory.
  const tooLarge = memoryProblem(2 * countBytes, request.maxBytes);
  if (tooLarge) return send({ kind: 'problems', problems: [tooLarge] });

  try {
    const input = shareArrays<ReadoutInput>({
      ...resolved.input,
      counts: await loadCounts(source, resolved.bins),
      nBins: binTo - binFrom,
      windowStartMs: tables.windowStartMs + binFrom * tables.binWidthMs,
    });
    const startedAt = performance.now();
    const planned = planReadout(input);
    if (!planned.ok) return await send({ kind: 'problems', problems: gravestFirst(planned.problems) });
    const plan = shareArrays<ReadoutPlan>(planned.plan);
    const needed = input.counts.byteLength + pool.threads.length * plan.estimate.bytes;
    const overfull = memoryProblem(needed, request.maxBytes);
    if (overfull) return await send({ kind: 'problems', problems: [overfull] });

    const { scope } = request;
    await send({ kind: 'planned', chunks: plan.chunks.length });
    if (scope.kind === 'all' && scope.splitAboveSeconds !== null) {
      const parts = partsFor(plan, pool.threads.length, scope.splitAboveSeconds);
      if (parts > 1) return await send({ kind: 'split', parts });
    }
    const outputs = await runPlan(request, pool, input, plan, send);
    if (scope.kind === 'part') return await send({ kind: 'partDone', chunks: outputs.size });
    const { predictions, trialsUsed, ...numbers } = finishReadout(
      input,
      plan,
      plan.chunks.map(({ id }) => outputs.get(id)!),
    );
    const predictionsKey = keys.predictions(request.labId, request.sessionId, request.readoutId);
    const computeMs = performance.now() - startedAt;
    await objectStore().put(
      predictionsKey,
      writePredictions(predictions),
      'application/vnd.apache.arrow.stream',
    );
    const { backend, description } = await pool.backend;
    const area = tables.units.find(({ name }) => name.toLowerCase() === 'area');
    await send({
      kind: 'done',
      numbers,
      counts: { ...resolved.counts, trialsUsed: trialsUsed.length },
      notes: resolved.notes,
      areas: area?.type === 'category' ? namesOf(area.values, input.unitIndex) : [],
      labelTrends: labelTrends(Float64Array.from(input.trialIndex, (trial) => input.y[trial])),
      predictionsKey,
      facts: { engineVersion, backend, coreType: description, libraries: libraryVersions(), computeMs },
    });
  } catch (error) {
    const problem = error instanceof ComputeFault ? error.problem : problemFrom(error);
    if (!problem) throw error;
    await send({ kind: 'problems', problems: [problem] });
  }
}

async function runPlan(
  request: ComputeRequest,
  pool: ThreadPool,
  input: ReadoutInput,
  plan: ReadoutPlan,
  send: (message: FromChild) => Promise<void>,
): Promise<Map<number, ChunkOutput>> {
  const chunkOf = new Map(plan.chunks.map((chunk) => [chunk.id, chunk]));
  const outputs = new Map<number, ChunkOutput>();
  for (const bytes of request.finished) {
    const output = decodeOutput(bytes);
    if (chunkOf.has(output.id)) outputs.set(output.id, output);
  }
  const { scope } = request;
  const chunks = scope.kind === 'part' ? splitChunks(plan.chunks, scope.parts)[scope.part] : plan.chunks;
  const keepsParts =
    scope.kind === 'part' || plan.estimate.seconds / pool.threads.length > request.keepPartsAboveSeconds;
  const meter = progressMeter(chunks, new Set(outputs.keys()), () => performance.now());
  const tell = () => void send({ kind: 'progress', progress: meter.read() });
  const timer = setInterval(tell, progressEveryMs);
  const room = Math.max(0, request.maxBytes - input.counts.byteLength) / pool.threads.length;
  const cacheBytes = Math.min(maxCacheBytes, Math.max(plan.estimate.bytes, room / 2));
  try {
    await runChunks(pool, { input, plan, chunks, cacheBytes }, outputs, {
      begun: (id) => meter.begun(chunkOf.get(id)!),
      finished: (output) => {
        meter.finished(output.id);
        if (keepsParts) void send({ kind: 'part', chunk: output.id, payload: encodeOutput(output) });
      },
    });
  } finally {
    clearInterval(timer);
  }
  await send({
    kind: 'progress',
    progress: { done: 1_000, total: 1_000, phase: 'Putting it together', secondsLeft: 0 },
  });
  return outputs;
}

function gravestFirst(problems: Problem[]): Problem[] {
  const rank = { stops: 0, warns: 1, notes: 2 };
  return [...problems].sort((a, b) => rank[a.severity] - rank[b.severity]);
}

function namesOf(values: (string | null)[], index: Int32Array): string[] {
  return [...new Set(Array.from(index, (unit) => values[unit]).filter((name) => name !== null))];
}
