import { slideWindows } from '@/lib/engine/features/slide-windows';
import { mainDesign, mainFeatures } from '@/lib/engine/readout/main-task';
import type { PlanBuilder } from '@/lib/engine/readout/plan-builder';
import type { FeatureSpec, ReadoutInput, Task, TimeWindow } from '@/lib/engine/readout/types';

/** Flops of a chunk of temporal generalisation. */
const GENERALISATION_FLOPS = 4e9;

/** The windows of a view; planning has checked that there are some. */
export function viewWindows(input: ReadoutInput, view: { widthMs: number; stepMs: number }): TimeWindow[] {
  const { widthMs, stepMs } = view;
  return slideWindows(widthMs, stepMs, input.windowStartMs, input.binWidthMs, input.nBins) ?? [];
}

/** Sizes of a population-size or learning view that the data allow. */
export function viewSizes(sizes: number[], most: number): number[] {
  return [...new Set(sizes)].filter((size) => size <= most).sort((a, b) => a - b);
}

/** Fewest training trials of the main folds: the most that a learning curve can train on everywhere. */
export function smallestTraining(builder: Pick<PlanBuilder, 'foldSets'>): number {
  return Math.min(...builder.foldSets[0].splits.map(({ train }) => train.length));
}

/** Adds the tasks and chunks of every view. Label draws are shared with the main readout. */
export function planViews(input: ReadoutInput, builder: PlanBuilder, nDraws: number): void {
  input.views.forEach((view, index) => {
    const taskOf = (item: number, features: Partial<FeatureSpec>, draws: number): Task => ({
      name: `view ${index} ${item}`,
      control: -1,
      view: index,
      item,
      features: { ...mainFeatures(input), ...features },
      design: mainDesign(input),
      draws,
      foldSet: 0,
    });
    switch (view.kind) {
      case 'timeCourse':
        viewWindows(input, view).forEach((window, item) => {
          const task = builder.addTask(taskOf(item, { window }, nDraws));
          builder.addSplitChunks(task, 'Time course', 'Time course: shuffled control');
        });
        return;
      case 'singleUnits':
        input.unitIndex.forEach((_, item) => {
          const task = builder.addTask(taskOf(item, { units: { one: item } }, nDraws));
          builder.addSplitChunks(task, 'Single units', 'Single units: shuffled control');
        });
        return;
      case 'populationSize': {
        const from = builder.tasks.length;
        viewSizes(view.sizes, input.unitIndex.length).forEach((size, at) => {
          for (let draw = 0; draw < view.draws; draw++) {
            const stream = (index * 1000 + at) * 1000 + draw;
            builder.addTask(taskOf(at, { units: { subset: { size, stream } } }, 0));
          }
        });
        builder.addBatchChunks(from, builder.tasks.length, 'Population size');
        return;
      }
      case 'learning': {
        const from = builder.tasks.length;
        viewSizes(view.sizes, smallestTraining(builder)).forEach((size, at) => {
          for (let draw = 0; draw < view.draws; draw++) {
            const stream = (index * 1000 + at) * 1000 + draw;
            builder.addTask({ ...taskOf(at, {}, 0), trainLimit: { size, stream } });
          }
        });
        builder.addBatchChunks(from, builder.tasks.length, 'Learning curve');
        return;
      }
      case 'weights':
        builder.foldSets[0].splits.forEach((split, at) => {
          const cost = builder.cost(builder.tasks[0], split.train.length, split.test.length);
          builder.addChunk('Weights', cost.fit + cost.label, `weights ${at}`, {
            kind: 'weights',
            task: 0,
            split: at,
          });
        });
        return;
      case 'temporalGeneralisation':
        return addGeneralisation(builder, index, viewWindows(input, view), taskOf);
    }
  });
}

function addGeneralisation(
  builder: PlanBuilder,
  index: number,
  windows: TimeWindow[],
  taskOf: (item: number, features: Partial<FeatureSpec>, draws: number) => Task,
): void {
  if (windows.length === 0) return;
  const task = taskOf(0, { window: windows[0] }, 0);
  builder.foldSets[0].splits.forEach((split, at) => {
    const cost = builder.cost(task, split.train.length, split.test.length);
    const test = 2 * split.test.length * builder.nFeatures(task) * windows.length;
    const each = cost.fit + cost.label + test;
    const size = Math.max(1, Math.min(windows.length, Math.floor(GENERALISATION_FLOPS / each)));
    for (let from = 0; from < windows.length; from += size) {
      const to = Math.min(windows.length, from + size);
      builder.addChunk('Temporal generalisation', (to - from) * each, `generalisation ${index} ${at}`, {
        kind: 'generalisation',
        view: index,
        split: at,
        from,
        to,
      });
    }
  });
}
