/** One kind of simulated session: how many were run, and in how many each 95 % interval held the true R². */
export interface CoverageCell {
  nTrials: number;
  nUnits: number;
  folds: 'stratified' | 'contiguous';
  nSessions: number;
  nestedCovered: number;
  testTrialCovered: number;
}

/** Written by npm run test:calibration (engine 1.0.0); see docs/calibration.md. */
export const coverageTable: readonly CoverageCell[] = [
  { nTrials: 100, nUnits: 20, folds: 'stratified', nSessions: 100, nestedCovered: 93, testTrialCovered: 74 },
  { nTrials: 100, nUnits: 20, folds: 'stratified', nSessions: 100, nestedCovered: 97, testTrialCovered: 79 },
  { nTrials: 100, nUnits: 20, folds: 'stratified', nSessions: 100, nestedCovered: 98, testTrialCovered: 93 },
  { nTrials: 100, nUnits: 20, folds: 'stratified', nSessions: 100, nestedCovered: 96, testTrialCovered: 94 },
  { nTrials: 200, nUnits: 20, folds: 'stratified', nSessions: 50, nestedCovered: 46, testTrialCovered: 46 },
  { nTrials: 200, nUnits: 60, folds: 'stratified', nSessions: 50, nestedCovered: 49, testTrialCovered: 43 },
  { nTrials: 200, nUnits: 60, folds: 'stratified', nSessions: 50, nestedCovered: 43, testTrialCovered: 42 },
  { nTrials: 200, nUnits: 60, folds: 'stratified', nSessions: 50, nestedCovered: 45, testTrialCovered: 44 },
  { nTrials: 200, nUnits: 60, folds: 'stratified', nSessions: 50, nestedCovered: 48, testTrialCovered: 46 },
  { nTrials: 400, nUnits: 60, folds: 'stratified', nSessions: 50, nestedCovered: 47, testTrialCovered: 46 },
  { nTrials: 400, nUnits: 60, folds: 'stratified', nSessions: 50, nestedCovered: 49, testTrialCovered: 47 },
  { nTrials: 100, nUnits: 150, folds: 'stratified', nSessions: 50, nestedCovered: 48, testTrialCovered: 45 },
  { nTrials: 200, nUnits: 60, folds: 'stratified', nSessions: 50, nestedCovered: 47, testTrialCovered: 44 },
  { nTrials: 200, nUnits: 60, folds: 'contiguous', nSessions: 50, nestedCovered: 47, testTrialCovered: 46 },
];
