import { Worker } from 'node:worker_threads';
import type { Chunk, ChunkOutput, ReadoutInput, ReadoutPlan } from '@/lib/engine/readout/types';
import { scheduleChunks } from '@/worker/compute/chunk-schedule';
import { ComputeFault } from '@/worker/compute/compute-fault';
import type { FromThread, ToThread } from '@/worker/compute/messages';

/** Threads of one compute child; they load the numerical library once and then take chunks. */
export interface ThreadPool {
  threads: Worker[];
  /** What the threads compute with. */
  backend: Promise<{ backend: string; description: string }>;
}

export function openThreads(count: number, entry: URL): ThreadPool {
  const threads = Array.from({ length: count }, () => new Worker(entry));
  const backend = new Promise<{ backend: string; description: string }>((resolve, reject) => {
    threads[0].once('error', reject);
    threads[0].once('message', (message: FromThread) => {
      if (message.kind === 'ready') resolve({ backend: message.backend, description: message.description });
    });
  });
  backend.catch(() => undefined); // told when it is awaited
  return { threads, backend };
}

/**
 * Runs those of `chunks` that `outputs` does not hold yet, each on whichever thread is free, and adds their outputs.
 * @throws ComputeFault with the engine's words when it refuses, Error when a thread dies
 */
export async function runChunks(
  pool: ThreadPool,
  work: { input: ReadoutInput; plan: ReadoutPlan; chunks: readonly Chunk[]; cacheBytes: number },
  outputs: Map<number, ChunkOutput>,
  hooks: { begun(chunkId: number): void; finished(output: ChunkOutput): void },
): Promise<void> {
  const { input, plan, chunks, cacheBytes } = work;
  const waiting = chunks.filter(({ id }) => !outputs.has(id));
  if (waiting.length === 0) return;
  const schedule = scheduleChunks(waiting);
  let left = waiting.length;
  await new Promise<void>((resolve, reject) => {
    pool.threads.forEach((thread, index) => {
      const send = (message: ToThread) => thread.postMessage(message);
      const sendNext = () => {
        const chunk = schedule.next(index);
        if (!chunk) return;
        hooks.begun(chunk.id);
        send({ kind: 'chunk', id: chunk.id });
      };
      thread.on('error', reject);
      thread.on('exit', () => reject(new Error('a compute thread ended early')));
      thread.on('message', (message: FromThread) => {
        if (message.kind === 'error')
          reject(message.problem ? new ComputeFault(message.problem) : new Error(message.message));
        if (message.kind !== 'output') return;
        outputs.set(message.output.id, message.output);
        left -= 1;
        sendNext();
        hooks.finished(message.output);
        if (left === 0) resolve();
      });
      send({ kind: 'load', input, plan, cacheBytes });
      sendNext();
    });
  });
}
