import { fork } from 'node:child_process';
import { mkdirSync, writeFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { parseArgs } from 'node:util';
import { format, resolveConfig } from 'prettier';
import { coverageModule } from '@/scripts/calibration/coverage-module';
import { cells } from '@/scripts/calibration/cells';
import { calibrationReport } from '@/scripts/calibration/calibration-report';
import { addChunk, loadResults, saveResults } from '@/scripts/calibration/results';
import { CHUNK_SEEDS } from '@/scripts/calibration/run-chunk';
import type { Tally } from '@/scripts/calibration/tally';

// npm run test:calibration -- [--sessions 4000] [--minutes 600] [--workers 2] [--only "null trend"]
// Runs what is missing, cell by cell in turn, keeps every finished chunk in docs/calibration.json, and writes
// docs/calibration.md and the table that captions quote from all that was ever run. Stop it whenever you like; the next run goes on from there.
const { values } = parseArgs({
  options: {
    sessions: { type: 'string', default: '4000' },
    minutes: { type: 'string', default: '600' },
    workers: { type: 'string', default: '2' },
    only: { type: 'string', default: '' },
  },
});
const nChunks = Math.ceil(Number(values.sessions) / CHUNK_SEEDS);
const endAt = Date.now() + Number(values.minutes) * 60_000;
mkdirSync('docs', { recursive: true });
const results = loadResults(CHUNK_SEEDS);

const tasks: { id: string; chunk: number }[] = [];
for (let chunk = 0; chunk < nChunks; chunk += 1) {
  for (const { id } of cells) {
    if (id.includes(values.only) && !results.cells[id]?.chunks.includes(chunk)) tasks.push({ id, chunk });
  }
}
console.log(`${tasks.length} chunks of ${CHUNK_SEEDS} sessions to run`);
let done = 0;
let savedAt = Date.now();

async function keep(): Promise<void> {
  saveResults(results);
  const style = await resolveConfig('docs/calibration.md');
  const write = async (path: string, text: string, parser: string): Promise<void> =>
    writeFileSync(path, await format(text, { ...style, parser }));
  await write('docs/calibration.md', calibrationReport(results), 'markdown');
  await write('lib/engine/measures/coverage-table.ts', coverageModule(results), 'typescript');
}

async function work(): Promise<void> {
  const child = fork(fileURLToPath(new URL('chunk-worker.ts', import.meta.url)), {
    execArgv: ['--import', 'tsx'],
  });
  try {
    while (tasks.length > 0 && Date.now() < endAt) {
      const task = tasks.shift();
      if (!task) break;
      const tally = await new Promise<Tally>((resolve, reject) => {
        child.once('exit', (code) =>
          reject(new Error(`a worker ended with ${code} at ${task.id}, chunk ${task.chunk}`)),
        );
        child.once('message', (message: { tally: Tally }) => {
          child.removeAllListeners('exit');
          resolve(message.tally);
        });
        child.send(task);
      });
      addChunk(results, task.id, task.chunk, tally);
      done += 1;
      if (Date.now() - savedAt > 10_000) {
        savedAt = Date.now();
        await keep();
        console.log(`${done} done, ${tasks.length} left`);
      }
    }
  } finally {
    if (child.connected) child.disconnect();
  }
}

await Promise.all(Array.from({ length: Number(values.workers) }, work));
await keep();
console.log(`${done} chunks run, ${tasks.length} left; docs/calibration.md is written`);
