import { Worker } from 'node:worker_threads';
import { finishReadout } from '@/lib/engine/readout/finish-readout';
import { planReadout } from '@/lib/engine/readout/plan-readout';
import type { ChunkOutput, ReadoutInput, ReadoutPlan } from '@/lib/engine/readout/types';
import { makeBenchInput } from '@/scripts/bench/make-bench-input';
import { benchSizes } from '@/scripts/bench/sizes';
import { scheduleChunks } from '@/worker/compute/chunk-schedule';
import { shareArrays } from '@/worker/compute/share-arrays';

/*
 * Times one size in a process of its own, on two threads as the worker does, and prints one JSON line:
 * seconds for held-out predictions and the shuffled control (what the Python halves do), seconds for the whole readout with its
 * intervals, R², exceedances, and the process's peak memory.
 * usage: run-engine.ts SIZE [windows]
 */
const size = benchSizes.find(({ name }) => name === process.argv[2]);
if (size === undefined) throw new Error(`there is no size ${process.argv[2]}`);
const windows = Number(process.argv[3] ?? size.windows);
const input = shareArrays<ReadoutInput>(makeBenchInput(size, windows));
const startedAt = performance.now();
const planned = planReadout(input);
if (!planned.ok) throw new Error(JSON.stringify(planned.problems));
const plan = shareArrays<ReadoutPlan>(planned.plan);
const planMs = performance.now() - startedAt;

// Both files are bundled by bench.mjs, since a thread takes no TypeScript.
const threads = Array.from(
  { length: 2 },
  () => new Worker(new URL('./bench-thread.mjs', import.meta.url), { workerData: { input, plan } }),
);
await Promise.all(threads.map((thread) => new Promise((resolve) => thread.once('message', resolve))));

async function run(chunks: ReadoutPlan['chunks']): Promise<{ ms: number; outputs: ChunkOutput[] }> {
  const outputs: ChunkOutput[] = [];
  const schedule = scheduleChunks(chunks);
  const start = performance.now();
  await Promise.all(
    threads.map(async (thread, index) => {
      for (let chunk = schedule.next(index); chunk !== null; chunk = schedule.next(index)) {
        const { id } = chunk;
        outputs.push(
          await new Promise<ChunkOutput>((resolve) => {
            thread.once('message', resolve);
            thread.postMessage(id);
          }),
        );
      }
    }),
  );
  return { ms: performance.now() - start, outputs };
}

const isPair = (chunk: ReadoutPlan['chunks'][number]): boolean => chunk.job.kind === 'pair';
// In W the main window is the first of the time course: it is not counted twice.
const isTimed = (chunk: ReadoutPlan['chunks'][number]): boolean =>
  !isPair(chunk) && !(windows > 1 && 'task' in chunk.job && chunk.job.task === 0);
const cpuAt = process.cpuUsage();
const timed = await run(plan.chunks.filter(isTimed));
const cpu = process.cpuUsage(cpuAt);
const rest = await run(plan.chunks.filter((chunk) => !isTimed(chunk)));
const finishAt = performance.now();
const numbers = finishReadout(input, plan, [...timed.outputs, ...rest.outputs]);
const finishMs = performance.now() - finishAt;
console.log(
  JSON.stringify({
    seconds: (planMs + timed.ms) / 1000,
    cpuSeconds: (cpu.user + cpu.system) / 1e6,
    wholeSeconds: (planMs + timed.ms + rest.ms + finishMs) / 1000,
    r2: numbers.heldOut.r2,
    exceedances: numbers.null?.exceedances,
    peakMegabytes: Math.round(process.resourceUsage().maxRSS / 1024),
  }),
);
await Promise.all(threads.map((thread) => thread.terminate()));
