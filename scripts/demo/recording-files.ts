import { stringify } from 'csv-stringify/sync';
import type { MadeRecording } from './make-recording';
import { nBins } from './make-recording';
import { npyBytes } from './npy-bytes';

export interface MadeFile {
  name: string;
  bytes: Uint8Array;
}

const table = (columns: string[], rows: (string | number)[][]): Uint8Array =>
  new TextEncoder().encode(stringify(rows, { header: true, columns }));

/** The files that the made-up rig would have left behind: spike counts as NPY, trials and units as CSV tables. */
export function recordingFiles(
  recording: MadeRecording,
  stem: string,
): { counts: MadeFile; trials: MadeFile; units: MadeFile } {
  const round = (value: number, digits: number): number => Number(value.toFixed(digits));
  return {
    counts: {
      name: `${stem}_counts.npy`,
      bytes: npyBytes(recording.counts, [recording.nTrials, recording.nUnits, nBins]),
    },
    trials: {
      name: `${stem}_trials.csv`,
      bytes: table(
        [
          'trial',
          'shared_motion_fraction',
          'realised_fraction',
          'speed',
          'direction',
          'contrast',
          'pupil',
          'block',
          'trial_start',
        ],
        Array.from(recording.nominal, (nominal, trial) => [
          trial + 1,
          nominal,
          round(recording.realised[trial], 6),
          round(recording.speed[trial], 4),
          recording.directionDeg[trial],
          recording.contrast[trial],
          round(recording.pupilMm[trial], 3),
          recording.block[trial],
          recording.trialStartS[trial],
        ]),
      ),
    },
    units: {
      name: `${stem}_units.csv`,
      bytes: table(
        ['unit', 'area', 'depth_um', 'isolation'],
        recording.unitArea.map((area, unit) => [
          unit + 1,
          area,
          recording.unitDepthUm[unit],
          recording.isolation[unit],
        ]),
      ),
    },
  };
}
