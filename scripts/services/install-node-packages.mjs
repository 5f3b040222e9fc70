import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { runStep } from './run-step.mjs';
import { waitForLock } from './wait-for-lock.mjs';

/** Runs `npm ci` when node_modules is missing or is not what package-lock.json says. */
export async function installNodePackages({ root, say }) {
  if (isUpToDate(root)) return;
  const unlock = await waitForLock({
    path: join(root, 'dist', 'installing.json'),
    onWait: () => say('The Node packages are being installed by another process; waiting for it …'),
  });
  try {
    if (isUpToDate(root)) return;
    say('Installing the Node packages (npm ci) …');
    await runStep({
      what: 'npm ci failed',
      command: 'npm',
      args: ['ci', '--include=dev', '--no-audit', '--no-fund'],
      root,
      // NODE_ENV=production would leave out what the tests need; npm --silent would hide what went wrong.
      env: { NODE_ENV: '', npm_config_loglevel: 'error' },
    });
  } finally {
    unlock();
  }
}

function isUpToDate(root) {
  const wanted = JSON.parse(readFileSync(join(root, 'package-lock.json'), 'utf8')).packages;
  let installed;
  try {
    // npm's own note of what lies in node_modules.
    installed = JSON.parse(readFileSync(join(root, 'node_modules', '.package-lock.json'), 'utf8')).packages;
  } catch {
    return false;
  }
  return Object.entries(wanted).every(
    ([path, { version, optional }]) =>
      path === '' || installed[path]?.version === version || (optional && installed[path] === undefined),
  );
}
