import { controlQuestion } from '@/lib/engine/controls/control-question';
import { judgeControl } from '@/lib/engine/controls/judge-control';
import { quantiles } from '@/lib/engine/measures/quantiles';
import type { CollectedOutputs } from '@/lib/engine/readout/collected-outputs';
import { finishInjection } from '@/lib/engine/readout/finish-injection';
import { heldOutNumbers, meanOfKnown, pooledR2 } from '@/lib/engine/readout/held-out-numbers';
import { nullNumbers } from '@/lib/engine/readout/null-numbers';
import { taskLabels } from '@/lib/engine/readout/task-data';
import type {
  ControlNumbers,
  HeldOutNumbers,
  NullNumbers,
  ReadoutInput,
  ReadoutPlan,
} from '@/lib/engine/readout/types';

/** Every control's numbers, outcome and sentence, in the recipe's order. `mainR2`, `mainP`: the readout's own. */
export function finishControls(
  input: ReadoutInput,
  plan: ReadoutPlan,
  outputs: CollectedOutputs,
  mainR2: number | null,
  mainP: number | null,
): ControlNumbers[] {
  return input.controls.map((control, index) => {
    const question = controlQuestion(control, input.labelName);
    if (control.kind === 'injection') {
      return { kind: control.kind, question, ...finishInjection(input, plan, outputs, control, index) };
    }
    const tasks = plan.tasks.flatMap((task, at) => (task.control === index ? [at] : []));
    const numbers = tasks.map((task) => taskNumbers(input, plan, outputs, task));
    if (control.kind === 'matched')
      return { kind: control.kind, question, ...matched(input, plan, tasks, numbers, control.draws) };
    if (tasks.length === 0) {
      const sentence = 'There are too few trials on one of the sides to compare.';
      return {
        kind: control.kind,
        question,
        heldOut: null,
        null: null,
        outcome: 'cannotTell',
        sentence,
        detail: {},
      };
    }
    const [first] = numbers;
    const judgement = judgeControl(control.kind, first.heldOut.r2, first.null, mainR2, mainP);
    const detail: Record<string, unknown> = {};
    if (control.kind === 'generalise') {
      const set = plan.foldSets[plan.tasks[tasks[0]].foldSet];
      detail.nTrain = set.splits[0].train.length;
      detail.withinR2 = numbers[1].heldOut.r2;
      detail.withinP = numbers[1].null?.p ?? null;
      const within = numbers[1].heldOut.r2;
      if (within !== null)
        judgement.sentence += ` Within the test levels, on as many training trials: ${within.toFixed(3).replace('-', '−')}.`;
    }
    if (control.kind === 'incremental' || control.kind === 'adjusted') {
      detail.warning =
        'A nuisance that is measured with error leaves a residue that this control cannot take out.';
    }
    return {
      kind: control.kind,
      question,
      heldOut: flatHeldOut(first.heldOut),
      null: first.null,
      ...judgement,
      detail,
    };
  });
}

/** Held-out numbers of a control, with the test-trial interval as flat numbers. */
function flatHeldOut(heldOut: HeldOutNumbers): Record<string, number | string | null> {
  const { testTrialInterval } = heldOut;
  return {
    r2: heldOut.r2,
    r: heldOut.r,
    rho: heldOut.rho,
    rmse: heldOut.rmse,
    mae: heldOut.mae,
    calibrationSlope: heldOut.calibrationSlope,
    calibrationIntercept: heldOut.calibrationIntercept,
    nTrials: heldOut.nTrials,
    effectiveTrials: heldOut.effectiveTrials,
    low: testTrialInterval?.low ?? null,
    high: testTrialInterval?.high ?? null,
    intervalMethod: testTrialInterval?.method ?? null,
  };
}

interface TaskNumbers {
  heldOut: HeldOutNumbers;
  null: NullNumbers | null;
}

/** Held-out numbers and shuffled control of one task. */
export function taskNumbers(
  input: ReadoutInput,
  plan: ReadoutPlan,
  outputs: CollectedOutputs,
  task: number,
): TaskNumbers {
  const y = taskLabels(input, plan, plan.tasks[task]);
  const repeats = outputs.predictions(task);
  const heldOut = heldOutNumbers(y, repeats, input.folds.kind === 'contiguous', null, input.seed, task);
  const values = outputs.nullR2(task);
  return { heldOut, null: nullNumbers(input.nullScheme.kind, heldOut.r2, values, plan.logArrangements) };
}

function matched(
  input: ReadoutInput,
  plan: ReadoutPlan,
  tasks: number[],
  numbers: TaskNumbers[],
  wanted: number,
): Omit<ControlNumbers, 'kind' | 'question'> {
  if (tasks.length < wanted) {
    const sentence = 'Too few trials are left when the label is balanced over the nuisance.';
    return { heldOut: null, null: null, outcome: 'cannotTell', sentence, detail: { draws: tasks.length } };
  }
  const r2 = numbers.map(({ heldOut }) => heldOut.r2);
  const mean = meanOfKnown(r2);
  const nKept = tasks.map((task) => plan.foldSets[plan.tasks[task].foldSet].trials.length);
  const draws = numbers[0].null?.values.length ?? 0;
  const averaged = Float64Array.from({ length: draws }, (_, b) => {
    let sum = 0;
    for (const { null: control } of numbers) sum += control?.values[b] ?? 0;
    return sum / numbers.length;
  });
  const control = nullNumbers(input.nullScheme.kind, mean, averaged, plan.logArrangements);
  const known = r2.filter((value): value is number => value !== null);
  const [low, high] = quantiles(known, [0.025, 0.975]) ?? [null, null];
  const kept = Math.round(nKept.reduce((a, b) => a + b, 0) / nKept.length);
  return {
    heldOut: {
      r2: mean,
      low,
      high,
      intervalMethod: 'spread over matched draws, 2.5 to 97.5 %',
      nTrials: kept,
    },
    null: control,
    ...judgeControl('matched', mean, control, null, null),
    detail: { draws: tasks.length, nKept: kept, nAll: plan.foldSets[0].trials.length, r2 },
  };
}

/** Pooled R² of a task, mean over repeats. */
export function taskR2(
  input: ReadoutInput,
  plan: ReadoutPlan,
  outputs: CollectedOutputs,
  task: number,
): number | null {
  const y = taskLabels(input, plan, plan.tasks[task]);
  return meanOfKnown(outputs.predictions(task).map((repeat) => pooledR2(y, repeat)));
}
