import { parentPort } from 'node:worker_threads';
import { portableLinalg } from '@/lib/engine/linalg/portable';
import { runChunk } from '@/lib/engine/readout/run-chunk';
import type { ChunkCache, ChunkOutput, ReadoutInput, ReadoutPlan } from '@/lib/engine/readout/types';
import { openNativeLinalg } from '@/lib/native/open-linalg';
import { boundedCache } from '@/worker/compute/bounded-cache';
import type { FromThread, ToThread } from '@/worker/compute/messages';
import { problemFrom } from '@/worker/compute/problem-from';

/* One thread of a compute child: loads the library once, then answers each chunk with its output. */
const port = parentPort;
if (!port) throw new Error('this file runs as a thread of a compute child');
const linalg = openNativeLinalg() ?? portableLinalg;
let work: { input: ReadoutInput; plan: ReadoutPlan; cache: ChunkCache } | null = null;

const send = (message: FromThread, transfer: ArrayBuffer[] = []) => port.postMessage(message, transfer);

port.on('message', (message: ToThread) => {
  try {
    if (message.kind === 'load') {
      work = { input: message.input, plan: message.plan, cache: boundedCache(message.cacheBytes) };
      return;
    }
    if (!work) throw new Error('a chunk came before its data');
    const chunk = work.plan.chunks.find(({ id }) => id === message.id);
    if (!chunk) throw new Error(`the plan has no chunk ${message.id}`);
    const output = runChunk(work.input, work.plan, chunk, linalg, work.cache);
    send({ kind: 'output', output }, buffersOf(output));
  } catch (error) {
    send({
      kind: 'error',
      chunk: message.kind === 'chunk' ? message.id : null,
      message: error instanceof Error ? (error.stack ?? error.message) : String(error),
      problem: problemFrom(error),
    });
  }
});
send({ kind: 'ready', backend: linalg.name, description: linalg.description });

/** Buffers that belong to the output alone are handed over instead of copied. */
function buffersOf(output: ChunkOutput): ArrayBuffer[] {
  const buffers = new Set<ArrayBuffer>();
  for (const value of Object.values(output.values))
    if (
      typeof value !== 'number' &&
      value.buffer instanceof ArrayBuffer &&
      value.byteLength === value.buffer.byteLength
    )
      buffers.add(value.buffer);
  return [...buffers];
}
