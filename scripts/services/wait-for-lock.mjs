import { existsSync, mkdirSync, readFileSync, rmSync, statSync, writeFileSync } from 'node:fs';
import { dirname } from 'node:path';
import { setTimeout as pause } from 'node:timers/promises';
import { identityOf, isRunning } from './process-identity.mjs';

/**
 * Takes a lock file for this process, waiting while another running one has it: for what start and test must not do at
 * once in a checkout. A lock whose holder is gone is taken over.
 *
 * @param {{ path: string, onWait: () => void }} options `onWait` is called once when somebody else has it
 * @returns {Promise<() => void>} gives it free
 */
export async function waitForLock({ path, onWait }) {
  mkdirSync(dirname(path), { recursive: true });
  for (let told = false; ;) {
    try {
      writeFileSync(path, JSON.stringify(identityOf(process.pid)), { flag: 'wx' });
      return () => rmSync(path, { force: true });
    } catch (error) {
      if (error.code !== 'EEXIST') throw error;
    }
    if (isHeld(path)) {
      if (!told) onWait();
      told = true;
      await pause(200);
    } else {
      rmSync(path, { force: true });
    }
  }
}

function isHeld(path) {
  try {
    return isRunning(JSON.parse(readFileSync(path, 'utf8')));
  } catch {
    // Being written or removed at this moment; a note that stays broken is older than any write takes.
    return existsSync(path) && Date.now() - statSync(path).mtimeMs < 2_000;
  }
}
