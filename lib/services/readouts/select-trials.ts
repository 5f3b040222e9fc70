import type { Problem } from '@/lib/contracts/problem';
import type { Recipe } from '@/lib/contracts/recipe';
import { matchConditions } from '@/lib/services/readouts/match-conditions';
import type { RecipeFault } from '@/lib/services/readouts/recipe-fault';
import type { SessionTables } from '@/lib/services/readouts/session-tables';
import { transformLabel } from '@/lib/services/readouts/transform-label';
import { usedColumns } from '@/lib/services/readouts/used-columns';

export interface TrialSelection {
  /** Included trials of the session, ascending. */
  trialIndex: Int32Array;
  /** The transformed label of every trial of the session; NaN where it is missing. */
  y: Float64Array;
  nExcluded: number;
  nMissing: number;
  notes: Problem[];
}

/**
 * The trials that take part: those that the recipe chooses, less the excluded ones, less those without a value in a
 * column that the recipe uses (counted), less those that given folds leave out.
 */
export function selectTrials(
  recipe: Recipe,
  tables: SessionTables,
  excluded: ReadonlySet<number>,
): { selection: TrialSelection } | { faults: RecipeFault[] } {
  const label = tables.trials.find(({ name }) => name === recipe.label);
  const fault = labelFault(recipe.label, tables);
  if (!label || label.type === 'category' || fault) return { faults: fault ? [fault] : [] };
  const y = transformLabel(label.values, recipe.labelTransform);
  const unfit = y.findIndex((value, trial) => Number.isNaN(value) && !Number.isNaN(label.values[trial]));
  if (unfit >= 0)
    return {
      faults: [
        {
          pointer: '/recipe/labelTransform',
          code: 'label-transform',
          message: `The logarithm of the label does not exist at trial ${unfit + 1}, where it is ${label.values[unfit]}.`,
          place: { trial: unfit, column: recipe.label },
        },
      ],
    };

  const choice = chooseTrials(recipe, tables);
  const used = usedColumns(recipe).flatMap(({ column, pointer }) => {
    const found = tables.trials.find(({ name }) => name === column);
    if (!found)
      choice.faults.push({ pointer, code: 'unknown-column', message: unknownColumn(column, tables) });
    return found ?? [];
  });
  if (choice.faults.length > 0) return { faults: choice.faults };

  const leftOutByFolds = givenAbsence(recipe, tables.nTrials);
  const included: number[] = [];
  let nExcluded = 0;
  let nMissing = 0;
  for (let trial = 0; trial < tables.nTrials; trial++) {
    if (!choice.rows[trial]) continue;
    if (excluded.has(trial) || leftOutByFolds[trial]) nExcluded += 1;
    else if (used.some(({ values }) => values[trial] === null || Number.isNaN(values[trial]))) nMissing += 1;
    else included.push(trial);
  }
  const notes: Problem[] = [];
  if (nMissing > 0)
    notes.push({
      code: 'trials-missing',
      severity: 'notes',
      message: `${nMissing} ${nMissing === 1 ? 'trial lacks' : 'trials lack'} a value in a column that the recipe uses and ${nMissing === 1 ? 'was' : 'were'} left out.`,
      place: {},
    });
  const selection = { trialIndex: Int32Array.from(included), y, nExcluded, nMissing, notes };
  const few = selectionFault(recipe.label, selection);
  return few ? { faults: [few] } : { selection };
}

function labelFault(name: string, tables: SessionTables): RecipeFault | null {
  const pointer = '/recipe/label';
  const column = tables.trials.find((candidate) => candidate.name === name);
  if (!column) return { pointer, code: 'unknown-column', message: unknownColumn(name, tables) };
  if (column.type === 'category')
    return {
      pointer,
      code: 'label-type',
      message: `“${name}” holds names. Outfold reads out continuous labels, linearly, from units recorded together; class labels, pseudo-populations and imaging traces are refused.`,
    };
  if (column.type === 'circular')
    return {
      pointer,
      code: 'label-type',
      message: `“${name}” is circular, and a linear readout of it has no meaning. Bring in its cosine or sine as a column and read that out.`,
    };
  return null;
}

function unknownColumn(name: string, tables: SessionTables): string {
  return `There is no trial column “${name}”. There are: ${tables.trials.map((column) => column.name).join(', ')}.`;
}

function chooseTrials(recipe: Recipe, tables: SessionTables): { rows: Uint8Array; faults: RecipeFault[] } {
  const { trials } = recipe;
  if ('where' in trials)
    return matchConditions(trials.where, tables.trials, tables.nTrials, '/recipe/trials/where');
  const rows = new Uint8Array(tables.nTrials).fill('all' in trials ? 1 : 0);
  const faults: RecipeFault[] = [];
  if ('ids' in trials)
    trials.ids.forEach((trial, at) => {
      if (trial < tables.nTrials) rows[trial] = 1;
      else
        faults.push({
          pointer: `/recipe/trials/ids/${at}`,
          code: 'no-such-trial',
          message: `There is no trial ${trial}: the session has ${tables.nTrials}, counted from 0.`,
        });
    });
  return { rows, faults };
}

/** Trials that given folds leave out: null in each repeat's row. */
function givenAbsence({ folds }: Recipe, nTrials: number): Uint8Array {
  const absent = new Uint8Array(nTrials);
  if (folds.kind !== 'given' || !folds.assignment) return absent;
  const rows = Array.isArray(folds.assignment[0])
    ? (folds.assignment as (number | null)[][])
    : [folds.assignment as (number | null)[]];
  for (let trial = 0; trial < nTrials; trial++)
    if (rows.every((row) => row[trial] === null)) absent[trial] = 1;
  return absent;
}

function selectionFault(label: string, { trialIndex, y }: TrialSelection): RecipeFault | null {
  if (trialIndex.length === 0)
    return { pointer: '/recipe/trials', code: 'no-trials', message: 'No trial is left to read out.' };
  if (trialIndex.every((trial) => y[trial] === y[trialIndex[0]]))
    return {
      pointer: '/recipe/label',
      code: 'constant-label',
      message: `The label “${label}” is ${y[trialIndex[0]]} in all ${trialIndex.length} trials that take part, so there is nothing to read out.`,
    };
  return null;
}
