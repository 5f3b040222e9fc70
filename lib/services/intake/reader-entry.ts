import { existsSync } from 'node:fs';
import path from 'node:path';

/**
 * Where the reader process's program is, and Node's options for it. The built one may read the program's own files and no
 * others; tests and development without a build run it from the sources.
 */
export function readerEntry(): { file: string; execArgv: string[] } {
  const root = process.cwd();
  const heap = '--max-old-space-size=256';
  // eslint-disable-next-line no-restricted-properties -- where a build lies is no setting of the product
  const { VITEST, OUTFOLD_WORKER_DIST, OUTFOLD_DIST } = process.env;
  // The worker has it beside itself; for the web server it lies in the build's other folder, or in the usual place. Tests
  // look only beside the running program, because an older build may lie elsewhere.
  const folders = [path.dirname(process.argv[1] ?? '')];
  if (!VITEST) {
    if (OUTFOLD_WORKER_DIST) folders.push(path.resolve(OUTFOLD_WORKER_DIST));
    if (OUTFOLD_DIST) folders.push(path.resolve(OUTFOLD_DIST, '..', 'worker'));
    folders.push(path.join(/* turbopackIgnore: true */ root, 'dist', 'worker'));
  }
  const folder = folders.find((one) =>
    existsSync(path.join(/* turbopackIgnore: true */ one, 'intake-child.mjs')),
  );
  if (folder === undefined)
    return {
      file: path.join(root, 'worker', 'intake-child', 'intake-child.ts'),
      execArgv: [heap, '--import', 'tsx'],
    };
  return {
    file: path.join(folder, 'intake-child.mjs'),
    execArgv: [
      heap,
      '--no-warnings',
      '--experimental-permission',
      `--allow-fs-read=${folder}/*`,
      `--allow-fs-read=${path.join(root, 'node_modules')}/*`,
      `--allow-fs-read=${path.join(root, 'package.json')}`,
    ],
  };
}
