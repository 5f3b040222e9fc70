import { EngineError } from '@/lib/engine/engine-error';
import { type CoverageCell, coverageTable } from '@/lib/engine/measures/coverage-table';

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
  const cells = coverageTable.filter((cell) => cell.folds === (hasFolds ? folds : 'stratified'));
  const distance = (cell: CoverageCell): number =>
    Math.hypot(Math.log(nTrials / cell.nTrials), Math.log(nUnits / cell.nUnits));
  const least = Math.min(...cells.map(distance));
  const alike = cells.filter((cell) => distance(cell) <= least + 1e-12 && cell.nSessions > 0);
  const [first] = alike;
  if (first === undefined) return null;
  const nSessions = alike.reduce((sum, cell) => sum + cell.nSessions, 0);
  const covered = alike.reduce(
    (sum, cell) => sum + (interval === 'nested' ? cell.nestedCovered : cell.testTrialCovered),
    0,
  );
  // Two cells may lie equally far off: the first names what the caption is about.
  const { nTrials: cellTrials, nUnits: cellUnits } = first;
  return {
    coverage: covered / nSessions,
    nSessions,
    nTrials: cellTrials,
    nUnits: cellUnits,
    folds: first.folds,
  };
}
