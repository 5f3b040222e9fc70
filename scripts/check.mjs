/**
 * npm run check: format, lint, types and layers. (That each layer rule bites is tests/unit/infra/layers.test.ts.)
 * Every step runs whatever the others say; ends with code 1 when one failed.
 */
import { fileURLToPath } from 'node:url';
import { realpathSync } from 'node:fs';
import { runStep, stopSteps } from './services/run-step.mjs';

const root = fileURLToPath(new URL('..', import.meta.url));

const steps = [
  ['format', 'prettier/bin/prettier.cjs', ['--check', '--log-level', 'warn', '.']],
  ['types', 'typescript/bin/tsc', ['--noEmit', '-p', '.']],
  [
    'layers',
    'dependency-cruiser/bin/dependency-cruise.mjs',
    [
      ...['app', 'components', 'db', 'lib', 'scripts', 'storage', 'tests', 'worker', 'proxy.ts'],
      ...['--config', '.dependency-cruiser.cjs', '--output-type', 'err'],
    ],
  ],
  ['lint', 'eslint/bin/eslint.js', ['--max-warnings', '0', '.']],
];

/**
 * Lint, which takes longest, beside all others.
 *
 * @returns {Promise<{ passed: number, failed: number }>}
 */
export async function check() {
  const results = [];
  const run = async (lane) => {
    for (const step of lane) results.push(await passes(step));
  };
  await Promise.all([
    run(steps.filter(([name]) => name === 'lint')),
    run(steps.filter(([name]) => name !== 'lint')),
  ]);
  const passed = results.filter(Boolean).length;
  return { passed, failed: results.length - passed };
}

async function passes([name, program, args]) {
  const began = Date.now();
  try {
    await runStep({
      what: `${name} found faults`,
      command: process.execPath,
      args: [`node_modules/${program}`, ...args],
      root,
    });
    console.log(`✓ ${name} (${((Date.now() - began) / 1000).toFixed(1)} s)`);
    return true;
  } catch (error) {
    console.error(`✗ ${error.message}`);
    return false;
  }
}

if (process.argv[1] && realpathSync(process.argv[1]) === fileURLToPath(import.meta.url)) {
  for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP'])
    process.on(signal, () => {
      void stopSteps().then(() => process.exit(130));
    });
  const { failed } = await check();
  process.exit(failed > 0 ? 1 : 0);
}
