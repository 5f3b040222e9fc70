import os from 'node:os';
import { log } from '@/lib/log/log';
import type { FromChild, ToChild } from '@/worker/compute/messages';
import { computeReadout } from '@/worker/compute/compute-readout';
import { openThreads } from '@/worker/compute/run-chunks';

/*
 * A compute child: one readout, then the end. It is started ahead of its work with its threads ready, so that a small
 * readout need not wait for a process. Its own thread never computes for long, so that it hears of everything at once.
 */
const nThreads = Math.max(1, Number(process.env.OUTFOLD_COMPUTE_THREADS) || 2);
const pool = openThreads(nThreads, new URL('./compute-thread.mjs', import.meta.url));

const send = (message: FromChild): Promise<void> =>
  new Promise((resolve) => {
    if (process.send === undefined || !process.connected) resolve();
    else process.send(message, undefined, undefined, () => resolve());
  });

// Without its worker nobody wants the result. SIGKILL, because exit() would wait for the threads' native calls.
const endAtOnce = (): void => void process.kill(process.pid, 'SIGKILL');
process.on('disconnect', endAtOnce);
// The worker may have been killed while this file was still being loaded: then the event has passed unheard.
if (!process.connected) endAtOnce();
for (const signal of ['SIGINT', 'SIGTERM'] as const) process.on(signal, () => undefined); // the worker decides
try {
  os.setPriority(Number(process.env.OUTFOLD_COMPUTE_NICE) || 0); // the web server on the same machine stays quick
} catch {
  // not allowed here: the work is only less polite
}

process.on('message', (message: ToChild) => {
  computeReadout(message.request, pool, send)
    .catch(async (error: unknown) => {
      const { message: text, stack, code } = error as Error & { code?: unknown };
      await send({ kind: 'error', message: stack ?? text, code: typeof code === 'string' ? code : null });
    })
    .finally(endAtOnce);
});
pool.backend.then(
  () => send({ kind: 'ready' }),
  (error: unknown) => {
    log.fatal({ err: error }, 'a compute process could not start');
    endAtOnce();
  },
);
