import { EngineError } from '@/lib/engine/engine-error';
import { quantileOfSorted } from '@/lib/engine/measures/quantile-of-sorted';
import type { NuisanceDesign, NuisanceTerm } from '@/lib/engine/nuisance/nuisance-design';
import { termColumns } from '@/lib/engine/nuisance/term-columns';
import type { NuisanceVariable } from '@/lib/engine/readout/types';

/**
 * Learns the coding of nuisance variables from training trials alone.
 *
 * linear → z; quadratic → z, z²; spline → natural cubic spline, 4 df (knots: least, quartiles and greatest value of the
 * training trials, equal ones merged, so ties leave fewer df); category → an indicator for each training level but the
 * lowest; a variable with `periodDeg` → cosine and sine, whatever its term. Each column is centred by its training mean.
 * A variable that does not vary on the training trials adds no column and is named in `constant`. No intercept.
 *
 * Shapes: `values` of each variable over the session's trials; `trainTrials` indexes them, at least 1. Mutates nothing.
 * Throws EngineError when a value is missing or not finite, a period is not positive, or there are no training trials.
 * Cost: O(trials · columns), and a sort for splines.
 * Source: natural splines as in Hastie, Tibshirani & Friedman, eq. 5.4–5.5; the rest are definitions.
 */
export function fitNuisance(
  variables: readonly NuisanceVariable[],
  trainTrials: ArrayLike<number>,
): NuisanceDesign {
  if (trainTrials.length === 0) {
    throw new EngineError('notEstimable', 'Nuisance terms need at least one training trial');
  }
  const design: NuisanceDesign = { terms: [], nColumns: 0, columnNames: [], constant: [] };
  for (const variable of variables) {
    const values = valuesAt(variable, trainTrials);
    const term = fitTerm(variable, values);
    term.centre = columnMeans(term, values);
    if (term.kind === 'constant') design.constant.push(variable.name);
    design.terms.push(term);
    design.columnNames.push(...columnNames(term));
    design.nColumns += term.centre.length;
  }
  return design;
}

function valuesAt(variable: NuisanceVariable, trials: ArrayLike<number>): Float64Array {
  const values = new Float64Array(trials.length);
  for (let i = 0; i < trials.length; i += 1) {
    const value = variable.values[trials[i]];
    if (value === undefined || !Number.isFinite(value)) {
      throw new EngineError('notFinite', `${variable.name} has no value at trial ${trials[i] + 1}`, {
        trial: trials[i],
        column: variable.name,
      });
    }
    values[i] = value;
  }
  return values;
}

function fitTerm(variable: NuisanceVariable, values: Float64Array): NuisanceTerm {
  const { name, term, periodDeg } = variable;
  const sorted = Float64Array.from(values).sort();
  const n = sorted.length;
  if (sorted[0] === sorted[n - 1]) return { kind: 'constant', name, centre: [] };
  if (periodDeg !== undefined) {
    if (!(periodDeg > 0) || !Number.isFinite(periodDeg)) {
      throw new EngineError('invalidOption', `${name}: a period of ${periodDeg}° is not positive`, {
        column: name,
      });
    }
    return { kind: 'circular', name, periodDeg, centre: [] };
  }
  if (term === 'category') {
    return { kind: 'category', name, levels: distinct(Array.from(sorted)), centre: [] };
  }
  if (term === 'spline') {
    const knots = distinct([0, 0.25, 0.5, 0.75, 1].map((p) => quantileOfSorted(sorted, p)));
    return { kind: 'spline', name, knots, centre: [] };
  }
  let mean = 0;
  for (let i = 0; i < n; i += 1) mean += values[i] / n;
  let squares = 0;
  for (let i = 0; i < n; i += 1) squares += ((values[i] - mean) * (values[i] - mean)) / n;
  const sd = Math.sqrt(squares);
  // Differences below the rounding of the values themselves are no variance.
  if (
    !(sd > 4 * Number.EPSILON * Math.max(Math.abs(sorted[0]), Math.abs(sorted[n - 1]))) ||
    !Number.isFinite(sd)
  ) {
    return { kind: 'constant', name, centre: [] };
  }
  return { kind: term, name, mean, sd, centre: [] };
}

function distinct(ascending: readonly number[]): number[] {
  return ascending.filter((value, i) => i === 0 || value !== ascending[i - 1]);
}

function columnMeans(term: NuisanceTerm, values: Float64Array): number[] {
  let sums: number[] = [];
  for (let i = 0; i < values.length; i += 1) {
    const columns = termColumns(term, values[i]) ?? [];
    if (i === 0) sums = columns.map(() => 0);
    for (let j = 0; j < columns.length; j += 1) sums[j] += columns[j];
  }
  return sums.map((sum) => sum / values.length);
}

function columnNames(term: NuisanceTerm): string[] {
  switch (term.kind) {
    case 'constant':
      return [];
    case 'linear':
      return [term.name];
    case 'quadratic':
      return [term.name, `${term.name}²`];
    case 'spline':
      return term.knots.slice(1).map((_, j) => `${term.name} (spline ${j + 1})`);
    case 'circular':
      return [`${term.name} (cos)`, `${term.name} (sin)`];
    case 'category':
      return term.levels.slice(1).map((level) => `${term.name} = ${level}`);
  }
}
