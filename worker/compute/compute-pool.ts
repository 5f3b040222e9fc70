import { fork, type ChildProcess } from 'node:child_process';
import { fileURLToPath } from 'node:url';
import { log } from '@/lib/log/log';
import type { ComputeProgress, ComputeRequest, FromChild, ToChild } from '@/worker/compute/messages';

export type ComputeOutcome = Extract<FromChild, { kind: 'done' | 'problems' | 'split' | 'partDone' }>;

export interface ComputeHooks {
  onProgress(progress: ComputeProgress): void;
  /** How many chunks the readout's plan has. */
  onPlanned?(chunks: number): void;
  /** A finished chunk worth keeping; the run is over only when it has been kept, or has failed to be. */
  onPart(chunk: number, payload: Uint8Array): Promise<void>;
}

export interface ComputePool {
  /**
   * Computes one readout in a process of its own. An abort kills it at once.
   * @throws ComputeLost when the process ended without an answer, Error with the child's words when it failed
   */
  run(request: ComputeRequest, hooks: ComputeHooks, abort: AbortSignal): Promise<ComputeOutcome>;
  /** Ends the process that waits ahead. Runs that go on are ended by their abort signals. */
  close(): void;
}

const endings = new Set<FromChild['kind']>(['done', 'problems', 'split', 'partDone']);

/** The compute process was killed or ran out of memory. */
export class ComputeLost extends Error {}

/** Keeps one process ready ahead of the work: a small readout then waits for nothing. */
export function computePool({ threads, nice }: { threads: number; nice: number }): ComputePool {
  const entry = fileURLToPath(new URL('./compute-child.mjs', import.meta.url));
  let spare: ChildProcess | null = null;
  let isClosed = false;

  function start(): ChildProcess {
    const child = fork(entry, [], {
      serialization: 'advanced',
      // Two BLAS threads under load are far slower than one; the work is parallel over chunks.
      env: {
        ...process.env,
        OPENBLAS_NUM_THREADS: '1',
        OMP_NUM_THREADS: '1',
        OUTFOLD_COMPUTE_THREADS: String(threads),
        OUTFOLD_COMPUTE_NICE: String(nice),
      },
    });
    child.once('exit', () => {
      if (spare === child) spare = null;
    });
    return child;
  }
  function prepare(): void {
    if (!isClosed) spare ??= start();
  }

  prepare();
  return {
    run(request, hooks, abort) {
      const child = spare ?? start();
      spare = null;
      return listen(child, request, hooks, abort).finally(() => setImmediate(prepare));
    },
    close() {
      isClosed = true;
      spare?.kill('SIGKILL');
    },
  };
}

function listen(
  child: ChildProcess,
  request: ComputeRequest,
  hooks: ComputeHooks,
  abort: AbortSignal,
): Promise<ComputeOutcome> {
  return new Promise((resolve, reject) => {
    const kill = () => child.kill('SIGKILL');
    if (abort.aborted) kill();
    abort.addEventListener('abort', kill, { once: true });
    let outcome: ComputeOutcome | Error | null = null;
    const keeping: Promise<void>[] = [];
    child.on('message', (message: FromChild) => {
      if (abort.aborted) return;
      if (message.kind === 'progress') hooks.onProgress(message.progress);
      if (message.kind === 'planned') hooks.onPlanned?.(message.chunks);
      if (message.kind === 'part') keeping.push(hooks.onPart(message.chunk, message.payload));
      if (endings.has(message.kind)) outcome = message as ComputeOutcome;
      if (message.kind === 'error')
        outcome = Object.assign(new Error(message.message), { code: message.code ?? undefined });
    });
    child.once('error', (error) => (outcome ??= error));
    // 'close' and not 'exit': what the child said last may still be on its way.
    child.once('close', async (code, signal) => {
      abort.removeEventListener('abort', kill);
      await Promise.allSettled(keeping);
      if (abort.aborted) reject(abort.reason as Error);
      else if (outcome instanceof Error) reject(outcome);
      else if (outcome) resolve(outcome);
      else reject(new ComputeLost(`the compute process ended early (${signal ?? `code ${code}`})`));
    });
    const message: ToChild = { kind: 'run', request };
    child.send(message, (error) => {
      if (error) log.warn({ err: error }, 'a compute process took no work');
    });
  });
}
