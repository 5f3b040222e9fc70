/**
 * npm test [-- part …]: every check and test, with throw-away services of its own. Parts: check, unit (with reference
 * and property), integration (with contract), browser; all by default. The last line is `N passed, N failed`.
 * Plain Node without packages until `npm ci` has run.
 */
import { mkdirSync, readFileSync, rmSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { ensureBuilt } from './services/build.mjs';
import { installMissingPackages } from './services/debian-packages.mjs';
import { findCommand } from './services/find-command.mjs';
import { installNodePackages } from './services/install-node-packages.mjs';
import { freePort } from './services/ports.mjs';
import { startProduct } from './services/product.mjs';
import { runStep, stopSteps } from './services/run-step.mjs';
import { startThrowAway } from './services/throw-away.mjs';

const root = fileURLToPath(new URL('..', import.meta.url));
const reports = join(root, 'dist', `reports-${process.pid}`);
const total = { passed: 0, failed: 0, skipped: 0 };
const say = (line) => console.log(line);
for (const stream of [process.stdout, process.stderr]) stream.on('error', () => {});

let services;
let built;
let ending;
function end(code) {
  ending ??= (async () => {
    await stopSteps();
    await services?.stop().catch((error) => console.error(error.message));
    built?.release();
    rmSync(reports, { recursive: true, force: true });
    if (code === 130) say('Stopped before the end.');
    if (total.skipped > 0) say(`${total.skipped} skipped`);
    say(`${total.passed} passed, ${total.failed} failed`);
    process.exit(code);
  })();
  return ending;
}
for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP'])
  process.on(signal, () => {
    if (!ending) console.error('\nStopping …');
    void end(130);
  });
for (const event of ['unhandledRejection', 'uncaughtException'])
  process.on(event, (error) => {
    console.error(error);
    total.failed++;
    void end(1);
  });

const parts = {
  async check() {
    const { check } = await import('./check.mjs');
    count(await check());
  },
  unit: () => vitest('unit', ['unit', 'reference', 'property']),
  async integration() {
    built ??= await ensureBuilt({ root, say });
    await withServices(async ({ env }) =>
      vitest('integration', ['integration', 'contract'], {
        ...env,
        OUTFOLD_BUILT_WORKER: join(root, built.workerFolder, 'main.mjs'),
      }),
    );
  },
  async browser() {
    built ??= await ensureBuilt({ root, say });
    await withServices(browser);
  },
};

try {
  const wanted = process.argv.slice(2);
  const unknown = wanted.filter((name) => !Object.hasOwn(parts, name));
  if (unknown.length > 0)
    throw new Error(`No such part: ${unknown.join(', ')}. There are ${Object.keys(parts).join(', ')}.`);
  const chosen = wanted.length > 0 ? wanted : Object.keys(parts);
  const needs = ['numerics'];
  if (chosen.includes('integration') || chosen.includes('browser')) needs.push('database', 'queue');
  if (chosen.includes('browser')) needs.push('browser');
  installMissingPackages(needs, say);
  await installNodePackages({ root, say });
  mkdirSync(reports, { recursive: true });
  for (const name of Object.keys(parts)) {
    if (!chosen.includes(name) || ending) continue;
    say(`\n== ${name}`);
    const began = Date.now();
    try {
      await parts[name]();
    } catch (error) {
      if (ending) break;
      // A part that did not come to its end counts as one failure, whatever it had done before.
      total.failed++;
      console.error(error.message);
    }
    say(`== ${name}: ${((Date.now() - began) / 1000).toFixed(0)} s`);
  }
  say('');
} catch (error) {
  if (!ending) {
    total.failed++;
    console.error(error.message);
  }
}
await end(total.failed > 0 ? 1 : 0);

function count({ passed, failed, skipped = 0 }) {
  total.passed += passed;
  total.failed += failed;
  total.skipped += skipped;
}

async function vitest(name, projects, env = {}) {
  const report = join(reports, `${name}.json`);
  const failure = await runStep({
    what: `${name} tests failed`,
    command: process.execPath,
    args: [
      ...['node_modules/vitest/vitest.mjs', 'run', '--passWithNoTests=false'],
      ...projects.flatMap((project) => ['--project', project]),
      ...['--reporter=default', '--reporter=json', `--outputFile.json=${report}`],
    ],
    root,
    env,
    shows: true,
  }).catch((error) => error);
  if (ending) return;
  const { numPassedTests, numFailedTests, numPendingTests, numTodoTests, testResults } = readReport(
    report,
    failure,
  );
  // A file that cannot be loaded has no tests to count.
  const broken = testResults.filter(
    ({ status, assertionResults }) =>
      status === 'failed' && !assertionResults.some((result) => result.status === 'failed'),
  ).length;
  const failed = numFailedTests + broken;
  // An error outside of any test (an unhandled rejection) fails the run as well.
  count({
    passed: numPassedTests,
    failed: failed > 0 || !(failure instanceof Error) ? failed : 1,
    skipped: numPendingTests + numTodoTests,
  });
}

async function browser({ env, children, secrets }) {
  const port = await freePort();
  const address = `http://127.0.0.1:${port}`;
  const productEnv = {
    ...env,
    HOST: '127.0.0.1',
    PORT: String(port),
    PUBLIC_URL: address,
    OUTFOLD_DEMO: '1',
    DEMO_PASSWORD: secrets.demoPassword,
  };
  await startProduct({ root, children, built, env: productEnv, host: '127.0.0.1', port });
  await runStep({
    what: 'The demonstration lab could not be set up',
    command: process.execPath,
    args: ['--import', 'tsx', 'scripts/demo/seed.ts'],
    root,
    env: productEnv,
  });
  const report = join(reports, 'browser.json');
  const failure = await runStep({
    what: 'browser tests failed',
    command: process.execPath,
    args: ['node_modules/@playwright/test/cli.js', 'test', '--reporter=list,json'],
    root,
    env: {
      ...productEnv,
      OUTFOLD_E2E_URL: address,
      PLAYWRIGHT_JSON_OUTPUT_NAME: report,
      CHROMIUM_PATH: process.env.CHROMIUM_PATH || findCommand('chromium'),
    },
    shows: true,
  }).catch((error) => error);
  if (ending) return;
  const { stats, errors } = readReport(report, failure);
  const failed = stats.unexpected + (errors?.length ?? 0);
  count({
    passed: stats.expected + stats.flaky,
    failed: failed > 0 || !(failure instanceof Error) ? failed : 1,
    skipped: stats.skipped,
  });
  if (failure instanceof Error)
    for (const name of ['web', 'worker'])
      console.error(`-- end of the log of ${name}\n${children.logTail(name)}`);
}

async function withServices(work) {
  services = await startThrowAway({ root, say: (line) => console.error(line) });
  try {
    await work(services);
  } finally {
    const stopping = services;
    services = undefined;
    await stopping.stop();
  }
}

function readReport(path, failure) {
  try {
    return JSON.parse(readFileSync(path, 'utf8'));
  } catch (error) {
    throw failure instanceof Error ? failure : new Error(`There is no test report: ${error.message}`);
  }
}
