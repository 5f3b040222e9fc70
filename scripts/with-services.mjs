/**
 * node scripts/with-services.mjs -- <command> [arguments]
 *
 * Starts throw-away MariaDB, Redis, S3 fake and mail fake on free loopback ports, migrates, runs the command with their
 * addresses in its environment, stops them and ends with the command's code.
 */
import { spawn } from 'node:child_process';
import { fileURLToPath } from 'node:url';
import { startThrowAway } from './services/throw-away.mjs';

const root = fileURLToPath(new URL('..', import.meta.url));
const separator = process.argv.indexOf('--');
const [command, ...args] = separator < 0 ? process.argv.slice(2) : process.argv.slice(separator + 1);
if (!command) {
  console.error('usage: node scripts/with-services.mjs -- <command> [arguments]');
  process.exit(2);
}

let child;
let stopRequested = false;
for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP'])
  process.on(signal, () => {
    stopRequested = true;
    child?.kill(signal);
  });

let exitCode = 1;
let services;
try {
  services = await startThrowAway({ root });
  if (!stopRequested) {
    child = spawn(command, args, { stdio: 'inherit', env: { ...process.env, ...services.env } });
    exitCode = await new Promise((resolve) => {
      child.once('error', (error) => {
        console.error(`${command}: ${error.message}`);
        resolve(127);
      });
      child.once('exit', (code, signal) => resolve(code ?? (signal ? 130 : 1)));
    });
  }
} catch (error) {
  console.error(error.message);
} finally {
  await services?.stop();
}
process.exit(exitCode);
