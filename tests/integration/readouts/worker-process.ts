import { execFile, spawn, type ChildProcess } from 'node:child_process';
import { mkdirSync, mkdtempSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { promisify } from 'node:util';

const root = fileURLToPath(new URL('../../..', import.meta.url));

/** Bundles the worker as the product does, into a folder of its own below dist (packages are found from there). */
export async function buildWorker(): Promise<string> {
  mkdirSync(join(root, 'dist'), { recursive: true });
  const folder = mkdtempSync(join(root, 'dist', 'test-worker-'));
  await promisify(execFile)(process.execPath, ['scripts/build-worker.mjs'], {
    cwd: root,
    env: { ...process.env, OUTFOLD_WORKER_DIST: folder },
  });
  return folder;
}

export interface WorkerProcess {
  pid: number;
  /** Everything that it has logged so far. */
  output(): string;
  /** SIGKILL, as the kernel or a power cut would. */
  kill(): Promise<void>;
  /** SIGTERM and wait for its end; gives the exit code. */
  stop(): Promise<number | null>;
}

/** Starts a real worker on the services of the environment. Limits are short, so that tests take seconds. */
export function startWorker(folder: string, env: Record<string, string> = {}): WorkerProcess {
  const child: ChildProcess = spawn(process.execPath, ['--enable-source-maps', join(folder, 'main.mjs')], {
    cwd: root,
    stdio: ['ignore', 'pipe', 'pipe'],
    env: {
      ...process.env,
      LOG_LEVEL: 'debug',
      WORKER_STALE_MS: '1500',
      WORKER_WAITING_MS: '1000',
      WORKER_RECONCILE_MS: '300',
      WORKER_HEARTBEAT_MS: '200',
      WORKER_RELAY_MS: '200',
      WORKER_DRAIN_MS: '200',
      WORKER_NICE: '0',
      WORKER_SPLIT_SECONDS: '3600',
      ...env,
    },
  });
  let output = '';
  for (const stream of [child.stdout, child.stderr])
    stream?.on('data', (part: Buffer) => (output += part.toString()));
  const ended = new Promise<number | null>((resolve) => child.once('close', (code) => resolve(code)));
  return {
    pid: child.pid!,
    output: () => output,
    kill: async () => {
      child.kill('SIGKILL');
      await ended;
    },
    stop: () => {
      child.kill('SIGTERM');
      return ended;
    },
  };
}
