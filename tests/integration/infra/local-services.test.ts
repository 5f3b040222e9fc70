import { spawn, type ChildProcess } from 'node:child_process';
import { existsSync, readdirSync, readFileSync, statSync } from 'node:fs';
import { join } from 'node:path';
import { createConnection, type RowDataPacket } from 'mysql2/promise';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { temporaryFolder } from '@/tests/support/temporary-folder';

/** A supervisor as npm start has one, on a folder of its own; tells its services' addresses on standard output. */
const supervisor = `
  const { startLocalServices } = await import('./scripts/services/local-services.mjs');
  const [dataDir] = process.argv.slice(1);
  try {
    const services = await startLocalServices({ dataDir, settings: {}, throwAway: true, say: console.error });
    process.on('SIGTERM', () => services.stop().then(() => process.exit(0)));
    console.log(JSON.stringify({ env: services.env, children: services.children.list() }));
  } catch (error) {
    console.log(JSON.stringify({ error: error.message }));
  }
`;

interface Told {
  env: Record<string, string>;
  children: { name: string; pid: number }[];
  error?: string;
}

const isAlive = (pid: number) => {
  try {
    return !readFileSync(`/proc/${pid}/stat`, 'utf8').includes(') Z ');
  } catch {
    return false;
  }
};

const ended = (child: ChildProcess) => new Promise((resolve) => child.once('exit', resolve));

describe('the local services of a data folder', () => {
  let folder: Awaited<ReturnType<typeof temporaryFolder>>;
  const processes: ChildProcess[] = [];
  beforeAll(async () => {
    folder = await temporaryFolder();
  });
  afterAll(async () => {
    const running = processes.filter(({ exitCode, signalCode }) => exitCode === null && signalCode === null);
    await Promise.all(
      running.map((child) => {
        const over = ended(child);
        child.kill('SIGTERM');
        return over;
      }),
    );
    await folder.remove();
  });

  function start(): Promise<{ child: ChildProcess; told: Told; said: () => string }> {
    const child = spawn(process.execPath, ['--input-type=module', '-e', supervisor, folder.path], {
      stdio: ['ignore', 'pipe', 'pipe'],
    });
    processes.push(child);
    let said = '';
    child.stderr.on('data', (bytes) => (said += String(bytes)));
    return new Promise((resolve, reject) => {
      let text = '';
      child.stdout.on('data', (bytes) => {
        text += String(bytes);
        if (text.includes('\n')) resolve({ child, told: JSON.parse(text) as Told, said: () => said });
      });
      child.once('exit', () => reject(new Error(`the supervisor ended early: ${said}`)));
    });
  }
  it('keep their secrets to their owner', async () => {
    const { child, told } = await start();
    expect(told.children.map(({ name }) => name)).toEqual(['mariadb', 'redis', 'object-store', 'mail']);
    expect(statSync(folder.path).mode & 0o777).toBe(0o700);
    for (const file of ['secrets.json', 'run/redis.conf', 'logs/mariadb.log'])
      expect(statSync(join(folder.path, file)).mode & 0o777).toBe(0o600);
    expect(existsSync(join(folder.path, 'run/mariadb-init.sql'))).toBe(false);
    const secrets = Object.values(
      JSON.parse(readFileSync(join(folder.path, 'secrets.json'), 'utf8')) as object,
    );
    for (const { pid } of told.children) {
      const commandLine = readFileSync(`/proc/${pid}/cmdline`, 'utf8');
      for (const secret of secrets) expect(commandLine).not.toContain(secret);
    }

    const connection = await createConnection(told.env.DATABASE_URL);
    await connection.query('create table kept (id int primary key)');
    await connection.query('insert into kept values (7)');
    await connection.end();

    const rootless = new URL(told.env.DATABASE_URL);
    rootless.username = 'root';
    rootless.password = '';
    await expect(createConnection(rootless.href)).rejects.toThrow(/denied/);

    const second = await start();
    expect(second.told.error).toMatch(/already runs on/);

    const over = ended(child);
    child.kill('SIGTERM');
    await over;
    expect(told.children.filter(({ pid }) => isAlive(pid))).toEqual([]);
    expect(readdirSync(join(folder.path, 'run')).filter((name) => name.endsWith('.json'))).toEqual([]);
  });

  it('do not outlive a killed supervisor, and come back with their data', async () => {
    const first = await start();
    const over = ended(first.child);
    first.child.kill('SIGKILL');
    await over;
    await expect
      .poll(() => first.told.children.filter(({ pid }) => isAlive(pid)), { timeout: 10_000 })
      .toEqual([]);

    const second = await start();
    expect(second.told.error).toBeUndefined();
    const connection = await createConnection(second.told.env.DATABASE_URL);
    const [rows] = await connection.query<RowDataPacket[]>('select id from kept');
    expect(rows).toEqual([{ id: 7 }]);
    await connection.end();
    const stopped = ended(second.child);
    second.child.kill('SIGTERM');
    await stopped;
    expect(second.told.children.filter(({ pid }) => isAlive(pid))).toEqual([]);
  });

  it('start again by themselves when one of them dies', async () => {
    const { child, told } = await start();
    const redis = told.children.find(({ name }) => name === 'redis')!;
    process.kill(redis.pid, 'SIGKILL');
    const note = join(folder.path, 'run/redis.json');
    await expect
      .poll(
        () =>
          existsSync(note) && (JSON.parse(readFileSync(note, 'utf8')) as { pid: number }).pid !== redis.pid,
        {
          timeout: 10_000,
        },
      )
      .toBe(true);
    const stopped = ended(child);
    child.kill('SIGTERM');
    await stopped;
    expect(existsSync(note)).toBe(false);
  });
});
