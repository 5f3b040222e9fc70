/**
 * npm start: from a fresh clone to a running product. Plain Node without packages until `npm ci` has run.
 * Settings come from the environment or a `.env` file; docker-less-setup.md lists them.
 */
import { fileURLToPath } from 'node:url';
import { resolve } from 'node:path';
import { setTimeout as pause } from 'node:timers/promises';
import { ensureBuilt } from './services/build.mjs';
import { installMissingPackages } from './services/debian-packages.mjs';
import { installNodePackages } from './services/install-node-packages.mjs';
import { startLocalServices } from './services/local-services.mjs';
import { freePort, isPortFree } from './services/ports.mjs';
import { hostInUrl, startProduct } from './services/product.mjs';
import { keepDemoPassword } from './services/keep-demo-password.mjs';
import { runMigrations } from './services/run-migrations.mjs';
import { runStep, stopSteps } from './services/run-step.mjs';
import { readSettings } from './services/settings.mjs';

const root = fileURLToPath(new URL('..', import.meta.url));
const say = (line) => console.log(line);
for (const stream of [process.stdout, process.stderr]) stream.on('error', () => {});

let services;
let built;
let ending;
/** Stops everything, once; whoever comes later waits for the same end. */
function end(code, line) {
  ending ??= (async () => {
    if (line) (code === 0 ? console.log : console.error)(line);
    await stopSteps();
    await services?.stop().catch((error) => console.error(error.message));
    built?.release();
    if (code === 0) say('Stopped.');
    process.exit(code);
  })();
  return ending;
}
for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP'])
  process.on(signal, () => {
    if (!ending) void end(0, '\nStopping …');
  });
process.on(
  'unhandledRejection',
  (error) => void end(1, error instanceof Error ? error.stack : String(error)),
);
process.on('uncaughtException', (error) => void end(1, error.stack));

try {
  await start();
} catch (error) {
  if (!ending) await end(1, `\nOutfold could not start. ${error.message}`);
}

async function start() {
  checkNode();
  const settings = readSettings(root);
  // Children inherit what .env says.
  Object.assign(process.env, settings);
  const dataDir = resolve(root, settings.OUTFOLD_DATA ?? '.data');
  installMissingPackages(
    [...(settings.DATABASE_URL ? [] : ['database']), ...(settings.REDIS_URL ? [] : ['queue']), 'numerics'],
    say,
  );
  await installNodePackages({ root, say });
  const host = settings.HOST ?? '127.0.0.1';
  const port = await choosePort(host, settings.PORT);

  const fail = (error) => void end(1, error.message);
  services = await startLocalServices({ dataDir, settings, say, onGivenUp: fail });
  const { children, secrets } = services;
  built = await ensureBuilt({ root, say });
  const hasDemo = settings.OUTFOLD_DEMO ? settings.OUTFOLD_DEMO === '1' : services.isAllLocal;
  const demoPassword = keepDemoPassword({ dataDir, secrets, given: settings.DEMO_PASSWORD });
  const env = {
    ...services.env,
    HOST: host,
    PORT: String(port),
    PUBLIC_URL:
      settings.PUBLIC_URL ??
      `http://${host === '0.0.0.0' || host === '::' ? '127.0.0.1' : hostInUrl(host)}:${port}`,
    OUTFOLD_DEMO: hasDemo ? '1' : '0',
    ...(hasDemo ? { DEMO_PASSWORD: demoPassword } : {}),
  };
  await runMigrations({ root, env });
  const { health } = await startProduct({ root, children, built, env, host, port });
  if (hasDemo) {
    const waiting = setTimeout(() => say('Preparing the demonstration lab …'), 3_000);
    await runStep({
      what: 'The demonstration lab could not be set up',
      command: process.execPath,
      args: ['--import', 'tsx', 'scripts/demo/seed.ts'],
      root,
      env,
    }).finally(() => clearTimeout(waiting));
  }
  const missing = await awayParts(health);
  say('');
  if (missing.length > 0)
    say(`Started, but these parts do not answer yet: ${missing.join(', ')}. See ${dataDir}/logs.`);
  say(`Outfold is at ${env.PUBLIC_URL}`);
  if (settings.PUBLIC_URL && !isSameAddress(settings.PUBLIC_URL, host, port))
    say(`  listening on ${host}:${port}`);
  if (hasDemo) {
    say('');
    say('Demonstration lab, sign in as');
    for (const role of ['lead', 'analyst', 'experimenter', 'observer']) say(`  ${role}@demo.outfold.test`);
    say('  lead@other.outfold.test   (a second lab)');
    say(`Password of all: ${demoPassword}`);
  }
  say('');
  say(`Data and logs: ${dataDir}. Ctrl-C stops everything.`);
}

function checkNode() {
  const [major, minor] = process.versions.node.split('.').map(Number);
  if (major !== 20 || minor < 9)
    throw new Error(`It needs Node 20.9 or a later 20; this is Node ${process.versions.node}.`);
}

/** PORT where it is set; else 3000, or a free one when 3000 is taken. */
async function choosePort(host, given) {
  if (given !== undefined) {
    const port = Number(given);
    if (!Number.isInteger(port) || port < 1 || port > 65_535)
      throw new Error(`PORT is not a port number: ${given}`);
    if (!(await isPortFree(port, host)))
      throw new Error(
        `Port ${port} on ${host} is in use or not allowed. Set PORT to another one, or leave it out.`,
      );
    return port;
  }
  if (await isPortFree(3000, host)) return 3000;
  const port = await freePort(host);
  say(`Port 3000 is in use; taking ${port}.`);
  return port;
}

/** The parts that the health check names as away, after some seconds of patience. */
async function awayParts(health) {
  let away = ['everything'];
  for (let tried = 0; tried < 20; tried++) {
    try {
      const response = await health();
      if (response.status === 200) return [];
      const { parts } = await response.json();
      away = Object.keys(parts ?? {}).filter(
        (name) => parts[name] !== 'ready' && parts[name]?.state !== 'ready',
      );
    } catch {
      // Asked again.
    }
    await pause(500);
  }
  return away;
}

function isSameAddress(publicUrl, host, port) {
  const url = new URL(publicUrl);
  return url.hostname === host && Number(url.port) === port;
}
