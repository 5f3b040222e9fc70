import { existsSync } from 'node:fs';
import path from 'node:path';

/**
 * Where the reader process's program is, and Node's options for it. The built one may read the program's own files and no
 * others; tests and development without a build run it from the sources.
 */
export function readerEntry(): { file: string; execArgv: string[] } {
  const root = process.cwd();
  const heap = '--max-old-space-size=256';
  const holds = (folder: string): boolean =>
    existsSync(path.join(/* turbopackIgnore: true */ folder, 'intake-child.mjs'));
  // The worker's own bundle first; the web server is told where that is, or it is at the usual place. Tests never take
  // the usual place, where an older build may lie.
  const own = path.dirname(process.argv[1] ?? '');
  const usual = path.resolve(
    /* turbopackIgnore: true */ root,
    process.env.OUTFOLD_WORKER_DIST || 'dist/worker',
  );
  const folder = holds(own) ? own : !process.env.VITEST && holds(usual) ? usual : undefined;
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
