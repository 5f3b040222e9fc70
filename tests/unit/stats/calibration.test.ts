import { describe, expect, it } from 'vitest';
import { portableLinalg } from '@/lib/engine/linalg/portable';
import { randomInteger } from '@/lib/engine/random/random-integer';
import { randomNormal } from '@/lib/engine/random/random-normal';
import { randomPoisson } from '@/lib/engine/random/random-poisson';
import { splitGenerator } from '@/lib/engine/random/split-generator';
import { calibrationReport } from '@/scripts/calibration/calibration-report';
import { cells, type CoverageCell } from '@/scripts/calibration/cells';
import { labelDesigns, nullSession } from '@/scripts/calibration/null-session';
import { addChunk, type Results } from '@/scripts/calibration/results';
import { CHUNK_SEEDS, runCalibrationChunk } from '@/scripts/calibration/run-chunk';
import { expectedErrors, signalSession } from '@/scripts/calibration/signal-session';

describe('the calibration’s own sessions', () => {
  it('the exact error of a linear readout on new trials is the mean over simulated new trials', () => {
    // Source: 40,000 new trials made from the generating model itself.
    const cell = cells.find((one): one is CoverageCell => one.kind === 'coverage' && one.strength === 0.3);
    if (!cell) throw new Error('no cell');
    const session = signalSession(cell, 7);
    const p = cell.nUnits;
    const random = splitGenerator(3, 'new trials');
    const weights = Float64Array.from({ length: p }, () => 0.02 * randomNormal(random));
    const trial = 17;
    const exact = expectedErrors(session, p, trial, 0.4, weights, 0.55);
    let sum = 0;
    let squares = 0;
    const n = 40_000;
    for (let i = 0; i < n; i += 1) {
      const y = randomInteger(random, 5) / 4;
      const gain = 0.2 * randomNormal(random);
      let predicted = 0.4;
      for (let j = 0; j < p; j += 1) {
        const rate = Math.exp(session.logRate[trial * p + j] + session.tuning[j] * (y - 0.5) + gain);
        predicted += weights[j] * randomPoisson(random, rate);
      }
      const error = (y - predicted) ** 2;
      sum += error;
      squares += error * error;
    }
    const mean = sum / n;
    const standardError = Math.sqrt((squares / n - mean * mean) / n);
    expect(Math.abs(mean - exact.readout)).toBeLessThan(4 * standardError);
    // Var of five equal levels 0 … 1 is .125; bias .05² on top.
    expect(exact.constant).toBeCloseTo(0.125 + 0.0025, 12);
  });

  it('null labels come in the designs they claim, and units never depend on them', () => {
    for (const design of labelDesigns) {
      const session = nullSession(design, true, 5);
      expect(session.counts).toEqual(nullSession('independent', true, 5).counts);
      const distinctInBlock = new Set(session.label.slice(0, 10)).size;
      if (design === 'blockConstant') expect(distinctInBlock).toBe(1);
      else expect(distinctInBlock).toBeGreaterThan(1);
    }
  });

  it('a chunk always gives the same sums, and is counted once however often it is added', () => {
    const cell = cells.find((one) => one.kind === 'label');
    if (!cell) throw new Error('no cell');
    const tally = runCalibrationChunk(cell, 3, portableLinalg);
    expect(runCalibrationChunk(cell, 3, portableLinalg)).toEqual(tally);
    expect(tally.sessions).toBe(CHUNK_SEEDS);
    const results: Results = { engineVersion: 'test', chunkSeeds: CHUNK_SEEDS, cells: {} };
    addChunk(results, cell.id, 3, tally);
    addChunk(results, cell.id, 3, tally);
    expect(results.cells[cell.id].tally.sessions).toBe(CHUNK_SEEDS);
    const report = calibrationReport(results);
    expect(report).toContain('Run so far: 0 to 50 sessions a cell');
    expect(report).not.toMatch(/NaN|Infinity|undefined/);
  });
});
