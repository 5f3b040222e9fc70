import { EngineError } from '@/lib/engine/engine-error';
import { coverageTable } from '@/lib/engine/measures/coverage-table';

/** What simulation measured of a 95 % interval in the cell most like a readout. */
export interface MeasuredCoverage {
  /** Share of simulated sessions whose interval held the fitted readouts' true R². */
  coverage: number;
  /** Sessions that were simulated. */
  nSessions: number;
  /** The cell's trials, units and folds. */
  nTrials: number;
  nUnits: number;
  folds: 'stratified' | 'contiguous';
}

/**
 * Measured coverage of an interval of held-out R² for similar numbers of trials and units, for the interval's caption.
 *
 * Among the simulated cells with the same kind of folds (those with no such cell: stratified), all cells at the least distance
 * √(ln(n/n')² + ln(p/p')²) are pooled (they differ in signal strength only).
 * Shapes: n, p ≥ 1. Mutates nothing. Returns null while no cell has been simulated. Throws EngineError for n or p below 1.
 * Cost: one pass over the table. Source: docs/calibration.md, written by npm run test:calibration.
 */
export function measuredCoverage(
  interval: 'nested' | 'testTrial',
  nTrials: number,
  nUnits: number,
  folds: 'stratified' | 'contiguous',
): MeasuredCoverage | null {
  if (!(nTrials >= 1) || !(nUnits >= 1)) {
    throw new EngineError('invalidOption', 'Coverage is looked up for at least one trial and one unit');
  }
  const hasFolds = coverageTable.some((cell) => cell.folds === folds);
  const wanted = hasFolds ? folds : 'stratified';
  let least = Infinity;
  let found: MeasuredCoverage | null = null;
  for (const cell of coverageTable) {
    if (cell.folds !== wanted) continue;
    const distance = Math.hypot(Math.log(nTrials / cell.nTrials), Math.log(nUnits / cell.nUnits));
    if (distance > least + 1e-12) continue;
    const covered = interval === 'nested' ? cell.nestedCovered : cell.testTrialCovered;
    const before = found === null || distance < least - 1e-12 ? null : found;
    least = Math.min(least, distance);
    const nSessions = (before?.nSessions ?? 0) + cell.nSessions;
    found = {
      coverage: ((before?.coverage ?? 0) * (before?.nSessions ?? 0) + covered) / nSessions,
      nSessions,
      nTrials: cell.nTrials,
      nUnits: cell.nUnits,
      folds: cell.folds,
    };
  }
  return found;
}
