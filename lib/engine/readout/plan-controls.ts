import { generaliseFolds } from '@/lib/engine/controls/generalise-folds';
import { matchedSubset } from '@/lib/engine/controls/matched-subset';
import { makeFoldSet } from '@/lib/engine/readout/make-fold-set';
import { mainDesign, mainFeatures } from '@/lib/engine/readout/main-task';
import type { PlanBuilder } from '@/lib/engine/readout/plan-builder';
import type {
  ControlSpec,
  DesignSpec,
  FeatureSpec,
  FoldsSpec,
  ReadoutInput,
  Task,
} from '@/lib/engine/readout/types';

/** Draws of the shuffled control that each session with an injected signal gets. */
export const INJECTION_NULL_DRAWS = 99;
const FEWEST_MATCHED_TRIALS = 20;

/** What people read while a control is worked out. */
const phases: Record<ControlSpec['kind'], string> = {
  nuisanceOnly: 'Control: nuisance only',
  incremental: 'Control: what the units add',
  adjusted: 'Control: nuisance taken out',
  totalRate: 'Control: total rate',
  rateNormalised: 'Control: rate-normalised',
  trialOrder: 'Control: trial order',
  window: 'Control: another window',
  matched: 'Control: matched trials',
  breakCorrelations: 'Control: correlations broken',
  generalise: 'Control: generalisation',
  injection: 'Control: injected signal',
};

/** Adds the tasks and chunks of every control. The main fold set is number 0. */
export function planControls(input: ReadoutInput, builder: PlanBuilder, nDraws: number): void {
  input.controls.forEach((control, index) => {
    const phase = phases[control.kind];
    const add = (
      features: Partial<FeatureSpec>,
      design: DesignSpec = mainDesign(input),
      foldSet = 0,
      item = 0,
    ): void => {
      const task: Task = {
        name: `control ${index} ${item}`,
        control: index,
        view: -1,
        item,
        features: { ...mainFeatures(input), ...features },
        design,
        draws: nDraws,
        foldSet,
      };
      builder.addSplitChunks(builder.addTask(task), phase, phase);
    };
    switch (control.kind) {
      case 'nuisanceOnly':
        return add({ kind: 'none' }, { kind: 'nuisanceOnly', nuisanceOf: index });
      case 'incremental':
      case 'adjusted':
        return add({}, { kind: control.kind, nuisanceOf: index });
      case 'totalRate':
      case 'rateNormalised':
      case 'trialOrder':
        return add({ kind: control.kind });
      case 'window':
        return add({ window: { startMs: control.startMs, endMs: control.endMs } });
      case 'breakCorrelations':
        return add({ breakCorrelations: control.scope });
      case 'matched': {
        for (let draw = 0; draw < control.draws; draw++) {
          const foldSet = addMatchedFolds(input, builder, control, index, draw);
          if (foldSet !== null) add({}, mainDesign(input), foldSet, draw);
        }
        return;
      }
      case 'generalise': {
        const main = builder.foldSets[0];
        const folds = generaliseFolds(
          main.trials,
          control.side,
          input.y,
          input.folds,
          main.nFolds,
          input.seed,
          index,
        );
        if ('message' in folds) return;
        add({}, mainDesign(input), builder.addFoldSet(folds.across), 0);
        add({}, mainDesign(input), builder.addFoldSet(folds.within), 1);
        return;
      }
      case 'injection':
        return addInjection(builder, control, index, phase);
    }
  });
}

function addMatchedFolds(
  input: ReadoutInput,
  builder: PlanBuilder,
  control: ControlSpec & { kind: 'matched' },
  index: number,
  draw: number,
): number | null {
  const { trials } = builder.foldSets[0];
  const finite = trials.filter((trial) => Number.isFinite(control.values[trial]));
  const y = Float64Array.from(finite, (trial) => input.y[trial]);
  const nuisance = Float64Array.from(finite, (trial) => control.values[trial]);
  const kept = matchedSubset(y, nuisance, control.isCategory, input.seed, index, draw);
  if (kept.length < FEWEST_MATCHED_TRIALS) return null;
  const part = kept.map((i) => finite[i]);
  let spec: FoldsSpec = input.folds;
  if (spec.kind === 'stratified')
    spec = { ...spec, repeats: 1, k: Math.min(spec.k, Math.floor(part.length / 4)) };
  if (spec.kind === 'contiguous') spec = { ...spec, k: Math.min(spec.k, Math.floor(part.length / 4)) };
  const { set } = makeFoldSet(input.y, part, spec, input.nTrials, input.labelName, input.seed);
  return set === null ? null : builder.addFoldSet(set);
}

function addInjection(
  builder: PlanBuilder,
  control: ControlSpec & { kind: 'injection' },
  index: number,
  phase: string,
): void {
  const main = builder.tasks[0];
  const p = builder.nFeatures(main);
  let fits = 0;
  for (const split of builder.foldSets[0].splits) {
    const cost = builder.cost(main, split.train.length, split.test.length);
    fits += cost.fit + (INJECTION_NULL_DRAWS + 1) * cost.label;
  }
  control.sizes.forEach((_, size) => {
    for (let draw = 0; draw < control.draws; draw++) {
      const calibration = draw === 0 ? 3e5 * p * (p + 600) : 0;
      builder.addChunk(phase, fits + calibration, `injection ${index} ${size}`, {
        kind: 'injection',
        control: index,
        size,
        draw,
      });
    }
  });
}
