import { existsSync } from 'node:fs';
import { join } from 'node:path';

/**
 * Starts the worker and the web server as children, and waits until both serve.
 *
 * @param {{ root: string, children: import('./children.mjs').Children, built: { webFolder: string, workerFolder: string },
 *   env: Record<string, string>, host: string, port: number }} options
 */
export async function startProduct({ root, children, built, env, host, port }) {
  const shared = {
    ...env,
    NODE_ENV: 'production',
    NEXT_TELEMETRY_DISABLED: '1',
    // Both start the reader of uploaded files, which is built beside the worker.
    OUTFOLD_WORKER_DIST: built.workerFolder,
  };
  const workerMain = join(root, built.workerFolder, 'main.mjs');
  if (!existsSync(workerMain)) throw new Error(`The build made no ${workerMain}`);
  const address = `http://${host === '0.0.0.0' || host === '::' ? '127.0.0.1' : hostInUrl(host)}:${port}`;
  const health = async () => fetch(`${address}/api/health`, { signal: AbortSignal.timeout(5_000) });
  await children.start({
    name: 'worker',
    command: process.execPath,
    args: ['--enable-source-maps', workerMain],
    cwd: root,
    env: shared,
    restarts: true,
  });
  await children.start({
    name: 'web',
    command: process.execPath,
    args: ['node_modules/next/dist/bin/next', 'start', '--hostname', host, '--port', String(port)],
    cwd: root,
    env: { ...shared, OUTFOLD_DIST: built.webFolder },
    restarts: true,
    // Ready or not ready (a part is away): it answers.
    ready: async () => [200, 503].includes((await health()).status),
  });
  return { address, health };
}

/** A host as it stands in an address: IPv6 in brackets. */
export function hostInUrl(host) {
  return host.includes(':') ? `[${host}]` : host;
}
