import { describe, expect, it } from 'vitest';
import { coverageTable } from '@/lib/engine/measures/coverage-table';
import { measuredCoverage } from '@/lib/engine/measures/measured-coverage';

describe('measured coverage for captions', () => {
  it('is that of the cells most like the readout, pooled over signal strengths (by hand)', () => {
    const alike = coverageTable.filter(
      (cell) => cell.nTrials === 200 && cell.nUnits === 60 && cell.folds === 'stratified',
    );
    const nSessions = alike.reduce((sum, cell) => sum + cell.nSessions, 0);
    const covered = alike.reduce((sum, cell) => sum + cell.nestedCovered, 0);
    expect(alike.length).toBeGreaterThan(1);
    expect(measuredCoverage('nested', 210, 55, 'stratified')).toMatchObject({
      nTrials: 200,
      nUnits: 60,
      nSessions,
    });
    expect(measuredCoverage('nested', 210, 55, 'stratified')?.coverage).toBeCloseTo(covered / nSessions, 12);
  });
  it('never speaks of contiguous folds from stratified ones', () => {
    expect(measuredCoverage('testTrial', 1e6, 1, 'contiguous')?.folds).toBe('contiguous');
  });
  it('refuses no trials', () => {
    expect(() => measuredCoverage('nested', 0, 5, 'stratified')).toThrow(/at least one trial/);
  });
});
