import { correlate } from '@/components/session/correlate';
import { countRecipe } from '@/components/recipe/count-recipe';
import { labelWords } from '@/components/recipe/label-words';
import type { RecipeFacts } from '@/components/recipe/recipe-facts';
import type { RecipeRowKey } from '@/components/recipe/recipe-form-state';
import { formatCount } from '@/lib/format/format-count';
import { formatNumber } from '@/lib/format/format-number';
import { formatPlural } from '@/lib/format/format-plural';
import { formatP } from '@/lib/format/format-p';
import { formatValue } from '@/lib/format/format-value';
import type { RecipeInput } from '@/lib/contracts/recipe';

/** One check of a recipe, at the row that it is about. */
export interface RecipeCheck {
  row: RecipeRowKey;
  severity: 'stops' | 'warns' | 'notes' | 'fine';
  message: string;
}

type Values = readonly (number | string | null)[];

function onlyNumbers(values: Values): (number | null)[] {
  return values.map((value) => (typeof value === 'number' ? value : null));
}

/** What can be told of a recipe without asking the server: it will go wrong, it may mislead, or it is fine. */
export function recipeChecks(recipe: RecipeInput, facts: RecipeFacts): RecipeCheck[] {
  const checks: RecipeCheck[] = [];
  const add = (row: RecipeRowKey, severity: RecipeCheck['severity'], message: string): void => {
    checks.push({ row, severity, message });
  };
  const { trialsUsed, unitsUsed } = countRecipe(recipe, facts);
  const label = facts.trialColumns.find((column) => column.name === recipe.label);
  const values = onlyNumbers(label?.values ?? []);
  const out = new Set(facts.excludedTrials);
  const included = values.map((value, trial) => (out.has(trial) ? null : value));
  const present = included.filter((value) => value !== null);
  const distinct = new Set(present).size;

  if (distinct < 2) add('label', 'stops', 'The label has one value only: there is nothing to read out.');
  else {
    const low = present.reduce((a, b) => Math.min(a, b));
    const high = present.reduce((a, b) => Math.max(a, b));
    const levels = distinct <= 12 ? `, ${formatCount(distinct)} levels` : '';
    add(
      'label',
      'fine',
      `${formatPlural(present.length, 'value')}, ${formatValue(low)} to ${formatValue(high)}${levels}.`,
    );
    const order = correlate(
      included,
      included.map((_, trial) => trial),
    );
    if (order.r !== null && Math.abs(order.r) > 0.2)
      add(
        'label',
        'warns',
        `The label goes with trial order (r ${formatNumber(order.r)}). Slow drift of the units can then look like the label.`,
      );
  }

  const labels = new Set(facts.labels.map((entry) => entry.column));
  for (const column of facts.trialColumns) {
    if (column.type === 'category' || column.name === recipe.label || labels.has(column.name)) continue;
    const { r, n } = correlate(included, onlyNumbers(column.values));
    // Beyond three standard errors of no correlation, and large enough to matter.
    if (r !== null && Math.abs(r) > 0.15 && Math.abs(r) > 3 / Math.sqrt(n))
      add(
        'nuisance',
        'warns',
        `${labelWords(column.name)} goes with the label (r ${formatNumber(r)}): keep it among the nuisances, and ask what the units add to it.`,
      );
  }

  if (trialsUsed < facts.nTrials)
    add(
      'trials',
      'notes',
      `${formatCount(trialsUsed)} of ${formatPlural(facts.nTrials, 'trial')}: left out, without a label, or not chosen.`,
    );
  else add('trials', 'fine', `All ${formatPlural(facts.nTrials, 'trial')}.`);

  if (unitsUsed === 0) add('units', 'stops', 'No unit passes this. Loosen the rule.');
  else add('units', 'fine', `${formatCount(unitsUsed)} of ${formatPlural(facts.units.length, 'unit')}.`);

  const { startMs, endMs } = recipe.window ?? { startMs: Number.NaN, endMs: Number.NaN };
  const bin = (ms: number): number => (ms - facts.windowStartMs) / facts.binWidthMs;
  const onEdge = (ms: number): boolean =>
    Math.abs(bin(ms) - Math.round(bin(ms))) < 1e-9 * Math.max(1, Math.abs(bin(ms)));
  const lastMs = facts.windowStartMs + facts.nBins * facts.binWidthMs;
  let nBins = Math.round(bin(endMs)) - Math.round(bin(startMs));
  if (!onEdge(startMs) || !onEdge(endMs)) {
    const near = (ms: number): number => facts.windowStartMs + Math.round(bin(ms)) * facts.binWidthMs;
    const wrong = !onEdge(startMs) ? startMs : endMs;
    add(
      'window',
      'stops',
      `${formatValue(wrong)} ms is not the edge of a bin. Bins are ${formatValue(facts.binWidthMs)} ms wide: use ${formatValue(near(wrong))}.`,
    );
    nBins = 1;
  } else if (endMs <= startMs) add('window', 'stops', 'The window ends before it begins.');
  else if (startMs < facts.windowStartMs || endMs > lastMs)
    add(
      'window',
      'stops',
      `The session was recorded from ${formatNumber(facts.windowStartMs, 0)} to ${formatNumber(lastMs, 0)} ms.`,
    );
  else if (endMs <= 0)
    add(
      'window',
      'warns',
      'The window ends before the alignment event: this is a negative control, not a readout.',
    );
  else if (startMs < 0) add('window', 'warns', 'The window begins before the alignment event.');
  else add('window', 'fine', `Starts at or after the event; ${formatPlural(nBins, 'bin')}.`);

  const features = recipe.features === 'bins' ? unitsUsed * Math.max(1, nBins) : unitsUsed;
  const k = recipe.folds?.k ?? 5;
  const training = Math.floor((trialsUsed * (k - 1)) / k) - 2 * (recipe.folds?.purgeTrials ?? 0);
  if (recipe.estimator?.kind === 'leastSquares' && features >= training)
    add(
      'estimator',
      'warns',
      `${formatPlural(features, 'feature')} on about ${formatPlural(training, 'training trial')}: least squares fits noise here. Use a penalty.`,
    );
  else if (recipe.estimator)
    add(
      'estimator',
      'fine',
      `${formatPlural(features, 'feature')}, about ${formatPlural(training, 'training trial')} a fold.`,
    );

  if (recipe.folds?.kind !== 'leaveOneGroupOut' && recipe.folds?.kind !== 'given') {
    if (k > trialsUsed)
      add('folds', 'stops', `${formatPlural(trialsUsed, 'trial')} cannot make ${formatCount(k)} folds.`);
    else if (training < 10)
      add(
        'folds',
        'stops',
        `About ${formatPlural(Math.max(0, training), 'trial')} would be left to fit on. Use fewer folds or a smaller purge gap.`,
      );
    else if (distinct >= 2 && distinct <= 12) {
      const counts = new Map<number, number>();
      for (const value of present) counts.set(value, (counts.get(value) ?? 0) + 1);
      const rarest = Math.min(...counts.values());
      if (recipe.folds?.kind === 'stratified' && rarest < k)
        add(
          'folds',
          'warns',
          `The rarest level has ${formatPlural(rarest, 'trial')}: not every fold will hold one.`,
        );
      else add('folds', 'fine', `The rarest level has ${formatPlural(rarest, 'trial')}.`);
    } else
      add(
        'folds',
        'fine',
        `About ${formatPlural(Math.floor(trialsUsed / k), 'trial')} held out in each fold.`,
      );
  }

  const scheme = recipe.null;
  if (!scheme || scheme.kind === 'none')
    add('null', 'warns', 'Without shuffles nothing can be said against chance.');
  else {
    const draws = scheme.draws ?? 1000;
    const column = facts.trialColumns.find((candidate) => candidate.name === scheme.column);
    if (scheme.kind === 'within' && column) {
      const sizes = new Map<number | string | null, number>();
      column.values.forEach((value, trial) => {
        if (included[trial] !== null) sizes.set(value, (sizes.get(value) ?? 0) + 1);
      });
      const least = Math.min(...sizes.values());
      const most = Math.max(...sizes.values());
      if (most < 2)
        add('null', 'stops', `Each value of ${column.name} has one trial: no two can change places.`);
      else
        add(
          'null',
          least < 5 ? 'warns' : 'fine',
          `${formatCount(least)}${least === most ? '' : ` to ${formatCount(most)}`} trials per ${column.name} can change places.`,
        );
    }
    if (draws < 199)
      add(
        'null',
        'warns',
        `The smallest p that ${formatPlural(draws, 'draw')} allow is ${formatP(1 / (draws + 1))}.`,
      );
  }
  const controls = recipe.controls ?? [];
  if (controls.length === 0)
    add(
      'controls',
      'notes',
      'Without controls the verdict says nothing about what else could have made the number.',
    );
  else add('controls', 'fine', `${formatPlural(controls.length, 'control')}, each with its own shuffles.`);
  return checks;
}
