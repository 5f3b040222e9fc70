import { lagOne } from '@/components/session/lag-one';
import { proposeControls } from '@/components/recipe/propose-controls';
import { proposeNuisances } from '@/components/recipe/propose-nuisances';
import type { RecipeFacts } from '@/components/recipe/recipe-facts';
import type { RecipeFormState } from '@/components/recipe/recipe-form-state';

/** A first recipe for a session, and why its folds and shuffles are proposed. */
export interface Proposal {
  form: RecipeFormState;
  why: { folds: string; null: string };
}

/** Whether a label has one value in each block. */
function isConstantInBlocks(
  label: readonly (number | string | null)[],
  block: readonly (number | string | null)[],
): boolean {
  const seen = new Map<number | string | null, number | string>();
  for (let trial = 0; trial < label.length; trial += 1) {
    const value = label[trial];
    if (value === null) continue;
    const first = seen.get(block[trial]);
    if (first === undefined) seen.set(block[trial], value);
    else if (first !== value) return false;
  }
  return seen.size > 0;
}

/**
 * Sensible defaults from the data: contiguous folds where the population rate drifts, shuffles within or of whole blocks
 * where there are blocks, the window from the alignment event on.
 */
export function proposeForm(facts: RecipeFacts, seed: number): Proposal {
  const { nBins, binWidthMs, windowStartMs, blockColumn } = facts;
  const label = facts.labels[0]?.column ?? '';
  const labelValues = facts.trialColumns.find((column) => column.name === label)?.values ?? [];
  const blockValues = facts.trialColumns.find((column) => column.name === blockColumn)?.values;
  const rateLag = lagOne(facts.rateHz) ?? 0;
  const drifts = rateLag > 0.2;
  const edge = (bin: number): number => windowStartMs + bin * binWidthMs;
  const firstBin = Math.max(0, Math.ceil(-windowStartMs / binWidthMs - 1e-9));
  const constant = blockValues ? isConstantInBlocks(labelValues, blockValues) : false;
  const shuffle = blockValues ? (constant ? 'groups' : 'within') : 'free';
  const nuisances = proposeNuisances(facts, label);
  const numeric = facts.trialColumns.find((column) => column.name !== label);
  const form: RecipeFormState = {
    label,
    labelTransform: 'none',
    trials: 'all',
    trialColumn: numeric?.name ?? '',
    trialOp: '=',
    trialValue: '',
    units: 'all',
    minRate: '1',
    minPresence: '0.9',
    area: facts.units.find((unit) => unit.area !== null)?.area ?? '',
    unitList: '',
    startMs: String(edge(firstBin < nBins ? firstBin : 0)),
    endMs: String(edge(nBins)),
    features: 'windowMean',
    transform: 'none',
    estimator: 'ridge',
    choose: 'leaveOneOut',
    value: '',
    innerFolds: '5',
    grid: 'default',
    gridFrom: '',
    gridTo: '',
    gridCount: '25',
    maxComponents: '',
    folds: drifts ? 'contiguous' : 'stratified',
    k: '5',
    purge: drifts ? '5' : '0',
    repeats: '1',
    groupColumn: blockColumn ?? numeric?.name ?? '',
    nuisance: Object.fromEntries(nuisances.map(({ column, term }) => [column, term])),
    handling: 'none',
    null: shuffle,
    nullColumn: blockColumn ?? numeric?.name ?? '',
    draws: '1000',
    controls: proposeControls(facts, nuisances),
    views: [],
    seed: String(seed),
    from: null,
  };
  return {
    form,
    why: {
      folds: drifts
        ? `Contiguous is proposed: the population rate drifts (lag-1 autocorrelation ${rateLag.toFixed(2)}). Hatched ends are not trained on when that fold is held out.`
        : `Random folds are proposed: the population rate hardly drifts (lag-1 autocorrelation ${rateLag.toFixed(2).replace('-', '−')}).`,
      null: !blockValues
        ? 'The session has no block column. A free shuffle needs labels that could have come in any order.'
        : constant
          ? `Whole groups, because the label does not change within a ${blockColumn}: single trials cannot change places fairly.`
          : `Within ${blockColumn}, because trials of one ${blockColumn} are alike in more than the label. The whole pipeline is repeated for each draw.`,
    },
  };
}
