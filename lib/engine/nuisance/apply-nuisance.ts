import { EngineError } from '@/lib/engine/engine-error';
import type { NuisanceDesign } from '@/lib/engine/nuisance/nuisance-design';
import { termColumns } from '@/lib/engine/nuisance/term-columns';
import type { NuisanceVariable } from '@/lib/engine/readout/types';

/** Coded trials, and the category levels that no training trial had. */
export interface NuisanceRows {
  /** nRows × nColumns, row-major, without an intercept. */
  matrix: Float64Array;
  nRows: number;
  nColumns: number;
  /** A trial with a level that was not in training: its columns of that variable are 0, the training average. */
  unseen: { variable: string; trial: number; level: number }[];
}

/**
 * Codes trials by a nuisance design that was fitted elsewhere (on training trials).
 *
 * Column = value of the fitted term − its training mean. A category level that the training trials did not have is coded
 * as the training average and listed in `unseen`, so that the caller can tell; it is never taken for another level.
 * Shapes: `variables` as at the fit, same order; `trials` indexes their values → trials.length × nColumns.
 * Mutates nothing. Throws EngineError when the variables are not those of the fit or a value is missing.
 * Cost: O(trials · columns). Source: definitions in fit-nuisance.
 */
export function applyNuisance(
  design: NuisanceDesign,
  variables: readonly NuisanceVariable[],
  trials: ArrayLike<number>,
): NuisanceRows {
  if (variables.length !== design.terms.length) {
    throw new EngineError(
      'shapeMismatch',
      `The design was fitted on ${design.terms.length} nuisance variables, not on ${variables.length}`,
    );
  }
  const { nColumns } = design;
  const nRows = trials.length;
  const matrix = new Float64Array(nRows * nColumns);
  const unseen: NuisanceRows['unseen'] = [];
  let offset = 0;
  design.terms.forEach((term, v) => {
    const variable = variables[v];
    if (variable.name !== term.name) {
      throw new EngineError('shapeMismatch', `${variable.name} stands where ${term.name} was fitted`);
    }
    for (let i = 0; i < nRows; i += 1) {
      const value = variable.values[trials[i]];
      if (value === undefined || !Number.isFinite(value)) {
        throw new EngineError('notFinite', `${term.name} has no value at trial ${trials[i] + 1}`, {
          trial: trials[i],
          column: term.name,
        });
      }
      const columns = termColumns(term, value);
      if (columns === null) {
        unseen.push({ variable: term.name, trial: trials[i], level: value });
        continue;
      }
      for (let j = 0; j < columns.length; j += 1) {
        matrix[i * nColumns + offset + j] = columns[j] - term.centre[j];
      }
    }
    offset += term.centre.length;
  });
  return { matrix, nRows, nColumns, unseen };
}
