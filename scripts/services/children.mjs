import { spawn } from 'node:child_process';
import {
  closeSync,
  mkdirSync,
  openSync,
  readdirSync,
  readFileSync,
  renameSync,
  rmSync,
  statSync,
  writeFileSync,
} from 'node:fs';
import { join } from 'node:path';
import { setTimeout as pause } from 'node:timers/promises';
import { findCommand } from './find-command.mjs';
import { identityOf, isRunning } from './process-identity.mjs';

const stopLimitMs = 10_000;
const maxLogBytes = 20 * 1024 * 1024;
const maxRestarts = 5;
const restartWindowMs = 60_000;

/**
 * The processes of one data folder. Each child leads its own process group (so a Ctrl-C reaches only the supervisor,
 * which stops them in order), writes to logs/<name>.log, is noted in run/<name>.json, and gets SIGTERM from the kernel
 * should the supervisor be killed.
 */
export class Children {
  #dataDir;
  #children = new Map();
  #stopping = false;
  #onGivenUp;

  /** @param onGivenUp called once with an Error when a child keeps dying */
  constructor(dataDir, { onGivenUp = () => {} } = {}) {
    this.#dataDir = dataDir;
    this.#onGivenUp = onGivenUp;
    mkdirSync(join(dataDir, 'run'), { recursive: true, mode: 0o700 });
    mkdirSync(join(dataDir, 'logs'), { recursive: true, mode: 0o700 });
  }

  /**
   * Starts a child and waits until `ready(child)` is true.
   *
   * @param {{ name: string, command: string, args: string[], env?: object, cwd?: string, restarts?: boolean,
   *   ready?: () => Promise<boolean>, readyLimitMs?: number, prepare?: () => Promise<void> | void }} spec
   */
  async start(spec) {
    if (this.#stopping) throw new Error('everything is being stopped');
    const record = { spec, process: undefined, expected: false, deaths: [], exited: undefined };
    this.#children.set(spec.name, record);
    await this.#launch(record);
  }

  /** Starts a stopped child again with the same command (same port, same folder). */
  async restart(name) {
    const record = this.#record(name);
    if (record.process) await this.stop(name);
    await this.#launch(record);
  }

  /** SIGTERM, or `signal`; SIGKILL to its whole group after ten seconds. Resolves when it is gone. */
  async stop(name, signal = 'SIGTERM') {
    const record = this.#record(name);
    const child = record.process;
    if (!child) return;
    record.expected = true;
    signalGroup(child.pid, signal);
    const timer = setTimeout(() => signalGroup(child.pid, 'SIGKILL'), stopLimitMs);
    await record.exited;
    clearTimeout(timer);
  }

  /** Stops all, last started first. */
  async stopAll() {
    this.#stopping = true;
    for (const name of [...this.#children.keys()].reverse()) await this.stop(name);
  }

  /** Name and process number of what runs now. */
  list() {
    return [...this.#children.values()]
      .filter(({ process: child }) => child)
      .map(({ spec, process: child }) => ({ name: spec.name, pid: child.pid }));
  }

  logTail(name, lines = 25) {
    try {
      return readFileSync(join(this.#dataDir, 'logs', `${name}.log`), 'utf8')
        .trimEnd()
        .split('\n')
        .slice(-lines)
        .join('\n');
    } catch {
      return '';
    }
  }

  #record(name) {
    const record = this.#children.get(name);
    if (!record) throw new Error(`no child is called ${name}`);
    return record;
  }

  async #launch(record) {
    const { spec } = record;
    await spec.prepare?.();
    const logPath = join(this.#dataDir, 'logs', `${spec.name}.log`);
    rotate(logPath);
    const logFd = openSync(logPath, 'a', 0o600);
    const setpriv = findCommand('setpriv');
    const [command, args] = setpriv
      ? [setpriv, ['--pdeathsig', 'TERM', spec.command, ...spec.args]]
      : [spec.command, spec.args];
    const child = spawn(command, args, {
      cwd: spec.cwd,
      env: { ...process.env, ...spec.env },
      detached: true,
      stdio: ['ignore', logFd, logFd],
    });
    closeSync(logFd);
    record.expected = false;
    record.process = child;
    let failure;
    record.exited = new Promise((resolve) => {
      child.once('error', (error) => {
        failure = error;
        record.process = undefined;
        resolve();
      });
      child.once('exit', (code, signal) => {
        failure = new Error(`${spec.name} ended (${signal ?? `code ${code}`})`);
        record.process = undefined;
        // What it started itself and left behind goes with it.
        signalGroup(child.pid, 'SIGKILL');
        rmSync(this.#pidfile(spec.name), { force: true });
        resolve();
      });
    });
    if (child.pid)
      writeFileSync(this.#pidfile(spec.name), JSON.stringify(identityOf(child.pid) ?? { pid: child.pid }), {
        mode: 0o600,
      });
    const assertAlive = () => {
      if (failure) throw new Error(`${failure.message}\n${this.logTail(spec.name)}`, { cause: failure });
    };
    const end = Date.now() + (spec.readyLimitMs ?? 60_000);
    while (spec.ready) {
      // Asked before the check: another process may answer on the port of one that has just died.
      await pause(20);
      assertAlive();
      if (await spec.ready().catch(() => false)) break;
      if (Date.now() > end) {
        await this.stop(spec.name);
        throw new Error(`${spec.name} did not become ready in time\n${this.logTail(spec.name)}`);
      }
    }
    void record.exited.then(() => this.#onExit(record, failure));
  }

  async #onExit(record, failure) {
    if (record.expected || this.#stopping || record.process) return;
    const { spec } = record;
    const now = Date.now();
    record.deaths = record.deaths.filter((time) => now - time < restartWindowMs);
    record.deaths.push(now);
    if (!spec.restarts || record.deaths.length > maxRestarts) {
      this.#onGivenUp(
        new Error(`${failure?.message ?? spec.name} and is not started again\n${this.logTail(spec.name)}`),
      );
      return;
    }
    console.error(
      `${failure.message}; starting it again (${record.deaths.length} of ${maxRestarts} in a minute); see ${join(this.#dataDir, 'logs', `${spec.name}.log`)}`,
    );
    await pause(250 * 2 ** (record.deaths.length - 1));
    if (this.#stopping || record.expected || record.process) return;
    await this.#launch(record).catch((error) => {
      if (!this.#stopping) return this.#onExit(record, error);
    });
  }

  #pidfile(name) {
    return join(this.#dataDir, 'run', `${name}.json`);
  }
}

/**
 * Stops what an earlier supervisor of this data folder left running (it was killed, or the machine's memory ran out):
 * every process noted in run/ that is still the very same one. Returns their names.
 */
export async function stopLeftovers(dataDir) {
  const stopped = [];
  const folder = join(dataDir, 'run');
  let files = [];
  try {
    files = readdirSync(folder).filter((file) => file.endsWith('.json') && file !== 'supervisor.json');
  } catch {
    return stopped;
  }
  for (const file of files) {
    const path = join(folder, file);
    let identity;
    try {
      identity = JSON.parse(readFileSync(path, 'utf8'));
    } catch {
      // A half-written note names no process.
    }
    if (isRunning(identity)) {
      signalGroup(identity.pid, 'SIGTERM');
      const end = Date.now() + stopLimitMs;
      while (isRunning(identity) && Date.now() < end) await pause(50);
      if (isRunning(identity)) signalGroup(identity.pid, 'SIGKILL');
      while (isRunning(identity)) await pause(50);
      stopped.push(file.replace(/\.json$/, ''));
    }
    rmSync(path, { force: true });
  }
  return stopped;
}

function signalGroup(pid, signal) {
  if (!pid) return;
  try {
    process.kill(-pid, signal);
  } catch {
    // The group is gone already.
  }
}

function rotate(path) {
  try {
    if (statSync(path).size > maxLogBytes) renameSync(path, `${path}.1`);
  } catch {
    // No log yet.
  }
}
