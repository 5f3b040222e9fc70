import { cells } from '@/scripts/calibration/cells';
import type { Results } from '@/scripts/calibration/results';

/**
 * Source text of lib/engine/measures/coverage-table.ts: the measured coverage that captions quote. Cells with one repeat and steady
 * units only; the report has the others.
 */
export function coverageModule(results: Results): string {
  const rows = cells.flatMap((cell) => {
    const tally = results.cells[cell.id]?.tally;
    if (cell.kind !== 'coverage' || !tally || cell.hasDrift || cell.repeats > 1) return [];
    const { nTrials, nUnits, folds } = cell;
    return [
      {
        nTrials,
        nUnits,
        folds,
        nSessions: tally.sessions,
        nestedCovered: tally['nested covered'] ?? 0,
        testTrialCovered: tally['bca covered'] ?? 0,
      },
    ];
  });
  return `/** One kind of simulated session: how many were run, and in how many each 95 % interval held the true R². */
export interface CoverageCell {
  nTrials: number;
  nUnits: number;
  folds: 'stratified' | 'contiguous';
  nSessions: number;
  nestedCovered: number;
  testTrialCovered: number;
}

/** Written by npm run test:calibration (engine ${results.engineVersion}); see docs/calibration.md. */
export const coverageTable: readonly CoverageCell[] = ${JSON.stringify(rows)};
`;
}
