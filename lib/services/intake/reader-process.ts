import { fork, type ChildProcess } from 'node:child_process';
import { readerEntry } from '@/lib/services/intake/reader-entry';

let spare: ChildProcess | null = null;

/** A reader process without a task: the one that waits, if there is one, or a new one. */
export function takeReader(): ChildProcess {
  const taken = spare;
  spare = null;
  if (taken === null || !taken.connected) return start();
  taken.removeAllListeners('exit');
  taken.ref();
  return taken;
}

/** Starts a process ahead of the next task, so that a small file waits for nothing. It ends with this process. */
export function keepReaderReady(): void {
  if (spare !== null) return;
  const child = start();
  child.once('exit', () => {
    if (spare === child) spare = null;
  });
  child.unref();
  child.channel?.unref();
  spare = child;
}

function start(): ChildProcess {
  const { file, execArgv } = readerEntry();
  return fork(file, [], {
    execArgv,
    serialization: 'advanced',
    // Nothing of ours: no settings, no credentials.
    env: { NODE_ENV: 'production' },
    stdio: ['ignore', 'ignore', 'pipe', 'ipc', 'pipe'],
  });
}
