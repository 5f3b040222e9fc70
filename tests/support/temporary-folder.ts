import { mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';

/** A new empty folder; call `remove` in afterAll or afterEach. */
export async function temporaryFolder(): Promise<{ path: string; remove: () => Promise<void> }> {
  const path = await mkdtemp(join(tmpdir(), 'outfold-files-'));
  return { path, remove: () => rm(path, { recursive: true, force: true }) };
}
