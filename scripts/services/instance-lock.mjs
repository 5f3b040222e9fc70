import { linkSync, mkdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { identityOf, isRunning } from './process-identity.mjs';

/**
 * Makes this process the only supervisor of a data folder. A note left by one that is gone is replaced.
 *
 * @returns a function that gives the folder free again
 * @throws Error when another supervisor runs on the folder
 */
export function lockInstance(dataDir) {
  const folder = join(dataDir, 'run');
  mkdirSync(folder, { recursive: true, mode: 0o700 });
  const path = join(folder, 'supervisor.json');
  const own = `${path}.${process.pid}`;
  writeFileSync(own, JSON.stringify(identityOf(process.pid)), { mode: 0o600 });
  try {
    for (let tried = 0; ; tried++) {
      try {
        // A link appears whole or fails: two supervisors that start together cannot both have it.
        linkSync(own, path);
        break;
      } catch (error) {
        if (error.code !== 'EEXIST' || tried > 3) throw error;
        const holder = readHolder(path);
        if (isRunning(holder))
          throw new Error(
            `Outfold already runs on ${dataDir} (process ${holder.pid}). Stop that one first, or set OUTFOLD_DATA to another folder.`,
          );
        rmSync(path, { force: true });
      }
    }
  } finally {
    rmSync(own, { force: true });
  }
  return () => {
    if (readHolder(path)?.pid === process.pid) rmSync(path, { force: true });
  };
}

function readHolder(path) {
  try {
    return JSON.parse(readFileSync(path, 'utf8'));
  } catch {
    return undefined;
  }
}
