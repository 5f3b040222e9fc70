import { createHash } from 'node:crypto';
import { existsSync, mkdirSync, readdirSync, readFileSync, rmSync, statSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { identityOf, isRunning } from './process-identity.mjs';
import { runStep } from './run-step.mjs';
import { waitForLock } from './wait-for-lock.mjs';

const sources = [
  'app',
  'components',
  'db',
  'lib',
  'public',
  'storage',
  'worker',
  'scripts/build-worker.mjs',
  'package.json',
  'package-lock.json',
  'next.config.mjs',
  'postcss.config.mjs',
  'proxy.ts',
  'tailwind.config.ts',
  'tsconfig.json',
  'tsconfig.next.json',
];

/**
 * The built product for the sources as they are: `dist/<hash of the sources>/{next,worker}`. Built only when it is not
 * there; a build never touches the one that a running product uses, so start and test can run side by side.
 *
 * @returns {Promise<{ webFolder: string, workerFolder: string, release: () => void }>} folders relative to `root`;
 *   `release` lets a later build remove it
 */
export async function ensureBuilt({ root, say }) {
  const hash = hashSources(root);
  const folder = join('dist', hash);
  const webFolder = join(folder, 'next');
  const workerFolder = join(folder, 'worker');
  const full = join(root, folder);
  const users = join(full, 'users');
  mkdirSync(users, { recursive: true });
  const note = join(users, `${process.pid}.json`);
  writeFileSync(note, JSON.stringify(identityOf(process.pid)));

  const unlock = await waitForLock({
    path: join(root, 'dist', 'building.json'),
    onWait: () => say('Another build of this checkout is under way; waiting for it …'),
  });
  try {
    const stamp = join(full, 'built');
    if (!existsSync(stamp)) {
      say('Building the product …');
      rmSync(join(full, 'next'), { recursive: true, force: true });
      rmSync(join(full, 'worker'), { recursive: true, force: true });
      const env = {
        NODE_ENV: 'production',
        NEXT_TELEMETRY_DISABLED: '1',
        OUTFOLD_DIST: webFolder,
        OUTFOLD_WORKER_DIST: workerFolder,
      };
      await runStep({
        what: 'The web part could not be built',
        command: process.execPath,
        args: ['node_modules/next/dist/bin/next', 'build'],
        root,
        env,
      });
      await runStep({
        what: 'The worker could not be built',
        command: process.execPath,
        args: ['scripts/build-worker.mjs'],
        root,
        env,
      });
      if (hashSources(root) !== hash) throw new Error('The sources changed during the build; start again.');
      writeFileSync(stamp, `${new Date().toISOString()}\n`);
      removeUnused(root, hash);
    }
  } finally {
    unlock();
  }
  return { webFolder, workerFolder, release: () => rmSync(note, { force: true }) };
}

function hashSources(root) {
  const hash = createHash('sha256').update(process.version);
  const visit = (path) => {
    const full = join(root, path);
    if (!existsSync(full)) return;
    if (statSync(full).isDirectory()) {
      for (const name of readdirSync(full).sort()) visit(join(path, name));
      return;
    }
    const bytes = readFileSync(full);
    hash.update(`\n${path} ${bytes.length}\n`).update(bytes);
  };
  sources.forEach(visit);
  return hash.digest('hex').slice(0, 16);
}

function removeUnused(root, hash) {
  const dist = join(root, 'dist');
  for (const name of readdirSync(dist)) {
    if (!/^[0-9a-f]{16}$/.test(name) || name === hash) continue;
    const users = join(dist, name, 'users');
    const isUsed =
      existsSync(users) &&
      readdirSync(users).some((file) => {
        try {
          return isRunning(JSON.parse(readFileSync(join(users, file), 'utf8')));
        } catch {
          return false;
        }
      });
    if (!isUsed) rmSync(join(dist, name), { recursive: true, force: true });
  }
}
