import { portableLinalg } from '@/lib/engine/linalg/portable';
import { openNativeLinalg } from '@/lib/native/open-linalg';
import { cells } from '@/scripts/calibration/cells';
import { runCalibrationChunk } from '@/scripts/calibration/run-chunk';

// A child process of main.ts: takes {id, chunk}, gives back {id, chunk, tally}.
const linalg = openNativeLinalg() ?? portableLinalg;

process.on('message', (task: { id: string; chunk: number }) => {
  const cell = cells.find((one) => one.id === task.id);
  if (!cell) throw new Error(`There is no cell ${task.id}`);
  process.send?.({ ...task, tally: runCalibrationChunk(cell, task.chunk, linalg) });
});
process.on('disconnect', () => process.exit(0));
