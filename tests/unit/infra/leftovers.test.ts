import { spawn } from 'node:child_process';
import { mkdirSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { afterEach, describe, expect, it } from 'vitest';
import { stopLeftovers } from '@/scripts/services/children.mjs';
import { lockInstance } from '@/scripts/services/instance-lock.mjs';
import { identityOf, isRunning } from '@/scripts/services/process-identity.mjs';
import { temporaryFolder } from '@/tests/support/temporary-folder';

describe('what an earlier run has left in a data folder', () => {
  const cleanups: (() => unknown)[] = [];
  afterEach(async () => {
    for (const cleanup of cleanups.splice(0).reverse()) await cleanup();
  });

  async function folderWithNote(name: string, note: unknown): Promise<string> {
    const folder = await temporaryFolder();
    cleanups.push(folder.remove);
    mkdirSync(join(folder.path, 'run'));
    writeFileSync(
      join(folder.path, 'run', `${name}.json`),
      typeof note === 'string' ? note : JSON.stringify(note),
    );
    return folder.path;
  }
  function sleeper(): number {
    // Deaf to SIGTERM would take ten seconds; this one listens.
    const child = spawn('sleep', ['60'], { detached: true, stdio: 'ignore' });
    cleanups.push(() => child.kill('SIGKILL'));
    return child.pid!;
  }

  it('is stopped when it is the very process of the note', async () => {
    const pid = sleeper();
    const note = identityOf(pid);
    expect(isRunning(note)).toBe(true);
    expect(await stopLeftovers(await folderWithNote('redis', note))).toEqual(['redis']);
    expect(isRunning(note)).toBe(false);
  });

  it('is left alone when another process has got the number since', async () => {
    const pid = sleeper();
    const note = { ...identityOf(pid), startTicks: '1' };
    expect(await stopLeftovers(await folderWithNote('redis', note))).toEqual([]);
    expect(isRunning(identityOf(pid))).toBe(true);
  });

  it('is cleared up when the note is broken', async () => {
    expect(await stopLeftovers(await folderWithNote('redis', '{"pid":'))).toEqual([]);
  });

  it('does not keep the folder locked when its supervisor is gone', async () => {
    const gone = { ...identityOf(process.pid), startTicks: '1' };
    const folder = await folderWithNote('supervisor', gone);
    const unlock = lockInstance(folder);
    expect(() => lockInstance(folder)).toThrow(`already runs on ${folder}`);
    unlock();
    lockInstance(folder)();
  });
});
