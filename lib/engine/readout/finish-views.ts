import { benjaminiHochberg } from '@/lib/engine/measures/benjamini-hochberg';
import { pearson } from '@/lib/engine/measures/pearson';
import { quantiles } from '@/lib/engine/measures/quantiles';
import { variance } from '@/lib/engine/measures/variance';
import type { CollectedOutputs } from '@/lib/engine/readout/collected-outputs';
import { taskNumbers, taskR2 } from '@/lib/engine/readout/finish-controls';
import { meanOfKnown } from '@/lib/engine/readout/held-out-numbers';
import { nullNumbers } from '@/lib/engine/readout/null-numbers';
import { smallestTraining, viewSizes, viewWindows } from '@/lib/engine/readout/plan-views';
import type { ReadoutInput, ReadoutPlan, ViewNumbers } from '@/lib/engine/readout/types';

/** Every view's numbers, in the recipe's order. */
export function finishViews(
  input: ReadoutInput,
  plan: ReadoutPlan,
  outputs: CollectedOutputs,
): ViewNumbers[] {
  return input.views.map((view, index): ViewNumbers => {
    const tasks = plan.tasks.flatMap((task, at) => (task.view === index ? [at] : []));
    switch (view.kind) {
      case 'timeCourse': {
        const windows = viewWindows(input, view);
        const { maximum, pFamily } = familyOf(input, plan, outputs, tasks);
        const rows = tasks.map((task, w) => {
          const { heldOut, null: control } = taskNumbers(input, plan, outputs, task);
          const { r2, r, rmse, testTrialInterval } = heldOut;
          const q = control?.quantiles;
          return {
            ...windows[w],
            r2,
            r,
            rmse,
            testTrialInterval,
            p: control?.p ?? null,
            pFamily: pFamily[w],
            nullQ05: q?.q05 ?? null,
            nullQ50: q?.q50 ?? null,
            nullQ95: q?.q95 ?? null,
          };
        });
        return {
          kind: view.kind,
          widthMs: view.widthMs,
          stepMs: view.stepMs,
          windows: rows,
          maximumNull: maximum,
        };
      }
      case 'singleUnits': {
        const { maximum, pFamily } = familyOf(input, plan, outputs, tasks);
        const rows = tasks.map((task, i) => {
          const r2 = taskR2(input, plan, outputs, task);
          const control = nullNumbers(input.nullScheme.kind, r2, outputs.nullR2(task), plan.logArrangements);
          return {
            unit: input.unitIndex[i],
            r2,
            p: control?.p ?? null,
            pFamily: pFamily[i],
            q: null as number | null,
          };
        });
        const ps = rows.map(({ p }) => p);
        if (ps.every((p): p is number => p !== null) && ps.length > 0) {
          benjaminiHochberg(ps).forEach((q, i) => (rows[i].q = q));
        }
        return { kind: view.kind, units: rows, maximumNull: maximum };
      }
      case 'populationSize':
      case 'learning': {
        const most = view.kind === 'learning' ? smallestTraining(plan) : input.unitIndex.length;
        const sizes = viewSizes(view.sizes, most);
        const r2 = batchR2(plan, outputs, tasks);
        const rows = sizes.map((size, at) => {
          const values = tasks.flatMap((task, i) => (plan.tasks[task].item === at ? [r2[i]] : []));
          const [q025, q50, q975] = quantiles(values, [0.025, 0.5, 0.975]) ?? [null, null, null];
          const spread = variance(values);
          return {
            size,
            mean: meanOfKnown(values),
            sd: spread === null ? null : Math.sqrt(spread),
            q025,
            q50,
            q975,
            values,
          };
        });
        return {
          kind: view.kind,
          draws: view.draws,
          most,
          left: view.sizes.filter((size) => size > most),
          sizes: rows,
        };
      }
      case 'temporalGeneralisation':
        return { kind: view.kind, ...generalisation(input, plan, outputs, index) };
      case 'weights':
        return { kind: view.kind, ...weights(input, plan, outputs) };
    }
  });
}

/** The null of the largest R² over a family of tasks, and each task's family-wise p (maximum statistic). */
function familyOf(
  input: ReadoutInput,
  plan: ReadoutPlan,
  outputs: CollectedOutputs,
  tasks: number[],
): { maximum: Record<string, unknown> | null; pFamily: (number | null)[] } {
  const nulls = tasks.map((task) => outputs.nullR2(task));
  const draws = plan.nDraws;
  if (draws === 0 || tasks.length === 0) return { maximum: null, pFamily: tasks.map(() => null) };
  const largest = Float64Array.from({ length: draws }, (_, b) =>
    nulls.reduce((most, values) => Math.max(most, values[b]), -Infinity),
  );
  const of = (r2: number | null) => nullNumbers(input.nullScheme.kind, r2, largest, plan.logArrangements);
  const pFamily = tasks.map((task) => of(taskR2(input, plan, outputs, task))?.p ?? null);
  const summary = of(0);
  return {
    maximum: summary === null ? null : { draws, smallestP: summary.smallestP, quantiles: summary.quantiles },
    pFamily,
  };
}

/** R² of tasks that were worked out in batches, in the order of `tasks`. */
function batchR2(plan: ReadoutPlan, outputs: CollectedOutputs, tasks: number[]): number[] {
  const byTask = new Map<number, number>();
  for (const { job } of plan.chunks) {
    if (job.kind !== 'batch') continue;
    outputs.array(outputs.of(job), 'r2').forEach((value, i) => byTask.set(job.from + i, value));
  }
  return tasks.map((task) => byTask.get(task) ?? 0);
}

function generalisation(
  input: ReadoutInput,
  plan: ReadoutPlan,
  outputs: CollectedOutputs,
  index: number,
): Record<string, unknown> {
  const view = input.views[index];
  if (view.kind !== 'temporalGeneralisation') throw new RangeError('not a temporal generalisation');
  const windows = viewWindows(input, view);
  const w = windows.length;
  const set = plan.foldSets[0];
  const error = Array.from({ length: set.nRepeats }, () => new Float64Array(w * w));
  const baseline = new Float64Array(set.nRepeats);
  for (const { job } of plan.chunks) {
    if (job.kind !== 'generalisation' || job.view !== index) continue;
    const values = outputs.of(job);
    const { repeat } = set.splits[job.split];
    outputs.array(values, 'error').forEach((e, i) => (error[repeat][job.from * w + i] += e));
    if (job.from === 0) baseline[repeat] += outputs.number(values, 'baseline') ?? 0;
  }
  const r2 = windows.map((_, i) =>
    windows.map((__, j) =>
      meanOfKnown(
        error.map((e, repeat) => (baseline[repeat] > 0 ? 1 - e[i * w + j] / baseline[repeat] : null)),
      ),
    ),
  );
  const overlap = view.widthMs > view.stepMs;
  return {
    widthMs: view.widthMs,
    stepMs: view.stepMs,
    windows,
    r2,
    windowsOverlap: overlap,
    takesNuisanceOut: false,
  };
}

/**
 * Weights and patterns, mean over folds and repeats, with their agreement: the mean correlation between the readouts of
 * two folds of the same repeat. Folds share training trials, so that agreement is no test.
 */
function weights(input: ReadoutInput, plan: ReadoutPlan, outputs: CollectedOutputs): Record<string, unknown> {
  const { splits } = plan.foldSets[0];
  const all = splits.map((_, split) => outputs.of({ kind: 'weights', task: 0, split }));
  const summary = (name: 'weights' | 'pattern') => {
    const rows = all.map((values) => outputs.array(values, name));
    const mean = Array.from(rows[0], (_, j) => rows.reduce((sum, row) => sum + row[j], 0) / rows.length);
    const sd = mean.map((_, j) => Math.sqrt(variance(rows.map((row) => row[j])) ?? 0));
    const pairs: (number | null)[] = [];
    rows.forEach((a, i) =>
      rows.forEach((b, j) => {
        if (i < j && splits[i].repeat === splits[j].repeat) pairs.push(a.length > 2 ? pearson(a, b) : null);
      }),
    );
    return { mean, sd, agreement: meanOfKnown(pairs) };
  };
  const perUnit =
    input.unitIndex.length === 0 ? 1 : outputs.array(all[0], 'weights').length / input.unitIndex.length;
  return {
    weights: summary('weights'),
    pattern: summary('pattern'),
    units: Array.from(input.unitIndex),
    featuresPerUnit: perUnit,
    folds: splits.length,
  };
}
