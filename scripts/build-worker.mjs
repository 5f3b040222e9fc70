/**
 * Bundles the worker and the entries of its child processes and threads into OUTFOLD_WORKER_DIST (dist/worker if not
 * set), each a file of its own name. Packages stay outside.
 */
import { rmSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { resolve } from 'node:path';
import { build } from 'esbuild';

const root = fileURLToPath(new URL('..', import.meta.url));
const entries = {
  main: 'worker/main.ts',
  'compute-child': 'worker/compute/compute-child.ts',
  'compute-thread': 'worker/compute/compute-thread.ts',
  'intake-child': 'worker/intake-child/intake-child.ts',
};
const outdir = resolve(root, process.env.OUTFOLD_WORKER_DIST || 'dist/worker');

rmSync(outdir, { recursive: true, force: true });
const { metafile } = await build({
  absWorkingDir: root,
  entryPoints: entries,
  outdir,
  outExtension: { '.js': '.mjs' },
  bundle: true,
  platform: 'node',
  target: 'node20',
  format: 'esm',
  packages: 'external',
  sourcemap: 'linked',
  logLevel: 'warning',
  metafile: true,
});

// A file of ours that is not there would be taken for a package, and missed only when the worker starts.
const missing = Object.values(metafile.outputs)
  .flatMap(({ imports }) => imports)
  .filter(({ path }) => path.startsWith('@/'));
if (missing.length > 0)
  throw new Error(`The worker imports what is not there: ${missing.map(({ path }) => path).join(', ')}`);
