import { spawn } from 'node:child_process';

const running = new Set();

/**
 * Runs a command to its end in its own process group. Its output is shown when `shows` is set, else only on failure.
 *
 * @throws Error that starts with `what`, with the output
 */
export async function runStep({ what, command, args, root, env = {}, shows = false }) {
  const child = spawn(command, args, {
    cwd: root,
    env: { ...process.env, ...env },
    detached: true,
    stdio: ['ignore', shows ? 'inherit' : 'pipe', shows ? 'inherit' : 'pipe'],
  });
  running.add(child);
  let output = '';
  child.stdout?.on('data', (bytes) => (output += bytes));
  child.stderr?.on('data', (bytes) => (output += bytes));
  const outcome = await new Promise((resolve) => {
    child.once('error', (error) => resolve(error.message));
    // What it started itself and left behind goes with it; it may also hold the output open.
    child.once('exit', () => signalGroup(child, 'SIGKILL'));
    child.once('close', (code, signal) =>
      resolve(code === 0 ? undefined : signal ? `stopped by ${signal}` : `code ${code}`),
    );
  });
  running.delete(child);
  if (outcome !== undefined)
    throw new Error([`${what} (${outcome})`, output.trimEnd()].filter(Boolean).join('\n'));
  return output;
}

/** Ends every step that still runs (for Ctrl-C in the middle of one): SIGTERM, and SIGKILL after five seconds. */
export async function stopSteps() {
  await Promise.all(
    [...running].map(async (child) => {
      if (child.exitCode !== null || child.signalCode !== null) return;
      const over = new Promise((resolve) => child.once('exit', resolve));
      signalGroup(child, 'SIGTERM');
      const timer = setTimeout(() => signalGroup(child, 'SIGKILL'), 5_000);
      await over;
      clearTimeout(timer);
    }),
  );
}

function signalGroup(child, signal) {
  try {
    if (child.pid) process.kill(-child.pid, signal);
  } catch {
    // Nothing is left of it.
  }
}
