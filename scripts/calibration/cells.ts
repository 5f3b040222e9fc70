import type { Centring } from '@/lib/engine/label/centring';
import { type LabelDesign, labelDesigns } from '@/scripts/calibration/null-session';
import type { NullFolds, NullScheme } from '@/scripts/calibration/run-null-session';

/** False positives of one kind of session, with every scheme on the same folds. */
export interface NullCell {
  kind: 'null';
  id: string;
  design: LabelDesign;
  hasDrift: boolean;
  folds: NullFolds;
}

/** Coverage of the intervals for one kind of session. */
export interface CoverageCell {
  kind: 'coverage';
  id: string;
  nTrials: number;
  nUnits: number;
  /** Tuning of the units; 0 is no signal. */
  strength: number;
  folds: NullFolds;
  k: number;
  repeats: number;
  hasDrift: boolean;
}

/** Bias and coverage of a trial's realised fraction; one simulated trial a seed. */
export interface LabelCell {
  kind: 'label';
  id: string;
  centring: Centring;
  fraction: number;
  nFrames: number;
  driftSd: number;
}

/** Coverage of the mean over animals; one simulated study a seed. */
export interface GroupCell {
  kind: 'group';
  id: string;
  nAnimals: number;
  nSessions: number;
  animalSd: number;
}

/** Power that the injection control states against the rate at which fresh sessions with such a signal are found. */
export interface InjectionCell {
  kind: 'injection';
  id: string;
  sizes: number[];
}

export type Cell = NullCell | CoverageCell | LabelCell | GroupCell | InjectionCell;

export const nullSchemes: readonly NullScheme[] = ['free', 'within', 'groups', 'circularShift'];

function nullCells(): NullCell[] {
  const cells: NullCell[] = [];
  for (const design of labelDesigns) {
    for (const hasDrift of [false, true]) {
      for (const folds of ['stratified', 'contiguous'] as const) {
        const id = `null ${design} ${hasDrift ? 'drift' : 'steady'} ${folds}`;
        cells.push({ kind: 'null', id, design, hasDrift, folds });
      }
    }
  }
  return cells;
}

function coverageCell(
  nTrials: number,
  nUnits: number,
  strength: number,
  changes: Partial<CoverageCell> = {},
): CoverageCell {
  const cell: CoverageCell = {
    kind: 'coverage',
    id: '',
    nTrials,
    nUnits,
    strength,
    folds: 'stratified',
    k: 5,
    repeats: 1,
    hasDrift: false,
    ...changes,
  };
  const extra = `${cell.folds} k${cell.k} r${cell.repeats} ${cell.hasDrift ? 'drift' : 'steady'}`;
  return { ...cell, id: `coverage n${nTrials} p${nUnits} s${strength} ${extra}` };
}

function labelCells(): LabelCell[] {
  const cells: LabelCell[] = [];
  for (const centring of ['location', 'axis', 'none'] as const) {
    for (const [nFrames, driftSd] of [
      [12, 0],
      [12, 1],
      [40, 0],
    ]) {
      for (const fraction of [0, 0.2, 0.4, 0.6, 0.8]) {
        const id = `label ${centring} ${fraction} t${nFrames} d${driftSd}`;
        cells.push({ kind: 'label', id, centring, fraction, nFrames, driftSd });
      }
    }
  }
  return cells;
}

function groupCells(): GroupCell[] {
  const cells: GroupCell[] = [];
  for (const nAnimals of [3, 6, 12]) {
    for (const animalSd of [0, 0.1]) {
      cells.push({
        kind: 'group',
        id: `group ${nAnimals}x5 sd${animalSd}`,
        nAnimals,
        nSessions: 5,
        animalSd,
      });
    }
  }
  return cells;
}

/** Every cell of the calibration, in the order of the report. */
export const cells: readonly Cell[] = [
  ...nullCells(),
  coverageCell(100, 20, 0),
  coverageCell(100, 20, 0.1),
  coverageCell(100, 20, 0.3),
  coverageCell(100, 20, 0.8),
  coverageCell(200, 20, 0.1),
  coverageCell(200, 60, 0),
  coverageCell(200, 60, 0.1),
  coverageCell(200, 60, 0.3),
  coverageCell(200, 60, 0.8),
  coverageCell(400, 60, 0.1),
  coverageCell(400, 60, 0.3),
  coverageCell(100, 150, 0.3),
  coverageCell(200, 60, 0.3, { k: 10 }),
  coverageCell(200, 60, 0.3, { repeats: 3 }),
  coverageCell(200, 60, 0.3, { folds: 'contiguous' }),
  coverageCell(200, 60, 0.3, { folds: 'contiguous', hasDrift: true }),
  coverageCell(200, 60, 0.3, { hasDrift: true }),
  ...labelCells(),
  ...groupCells(),
  { kind: 'injection', id: 'injection', sizes: [0.05, 0.1, 0.2, 0.3] },
];
