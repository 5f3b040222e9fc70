import { parentPort, workerData } from 'node:worker_threads';
import { portableLinalg } from '@/lib/engine/linalg/portable';
import { runChunk } from '@/lib/engine/readout/run-chunk';
import { runReadout } from '@/lib/engine/readout/run-readout';
import type { ChunkOutput, ReadoutInput, ReadoutPlan } from '@/lib/engine/readout/types';
import { openNativeLinalg } from '@/lib/native/open-linalg';
import { makeBenchInput } from '@/scripts/bench/make-bench-input';
import { boundedCache } from '@/worker/compute/bounded-cache';

/* One of the two threads of a timed run: takes chunk numbers, answers with outputs. */
const { input, plan } = workerData as { input: ReadoutInput; plan: ReadoutPlan };
const port = parentPort;
if (port === null) throw new Error('this file runs as a thread of the benchmark');
const linalg = openNativeLinalg() ?? portableLinalg;
const cache = boundedCache(64 * 2 ** 20);
port.on('message', (id: number) => {
  const output: ChunkOutput = runChunk(input, plan, plan.chunks[id], linalg, cache);
  port.postMessage(output);
});
// The hot functions are compiled before anything is timed, as the Python halves' libraries are.
const small = { name: '', n: 120, p: 40, windows: 1, draws: 400, sample: 0, batchedDraws: 0 };
for (let i = 0; i < 3; i++) runReadout(makeBenchInput(small, 1), linalg);
port.postMessage(null);
