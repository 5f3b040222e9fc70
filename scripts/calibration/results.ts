import { existsSync, readFileSync, renameSync, writeFileSync } from 'node:fs';
import { engineVersion } from '@/lib/engine/version';
import type { Tally } from '@/scripts/calibration/tally';

/** What has been run so far: for each cell the chunks done and their sums. */
export interface Results {
  engineVersion: string;
  chunkSeeds: number;
  cells: Record<string, { chunks: number[]; tally: Tally }>;
}

const path = 'docs/calibration.json';

/** Results kept so far; an empty start where there are none or another engine version made them. */
export function loadResults(chunkSeeds: number): Results {
  if (existsSync(path)) {
    const kept = JSON.parse(readFileSync(path, 'utf8')) as Results;
    if (kept.engineVersion === engineVersion && kept.chunkSeeds === chunkSeeds) return kept;
  }
  return { engineVersion, chunkSeeds, cells: {} };
}

/** Writes the results beside the old ones first, so that a stop in mid-write loses nothing. */
export function saveResults(results: Results): void {
  writeFileSync(`${path}.part`, `${JSON.stringify(results, null, 1)}\n`);
  renameSync(`${path}.part`, path);
}

/** Adds one chunk's sums; a chunk that is there already is left as it is. */
export function addChunk(results: Results, id: string, chunk: number, tally: Tally): void {
  const cell = (results.cells[id] ??= { chunks: [], tally: {} });
  if (cell.chunks.includes(chunk)) return;
  cell.chunks.push(chunk);
  cell.chunks.sort((a, b) => a - b);
  for (const [name, amount] of Object.entries(tally)) cell.tally[name] = (cell.tally[name] ?? 0) + amount;
}
