import type { ChunkOutput, ReadoutPlan } from '@/lib/engine/readout/types';

/** One repeat's held-out predictions; arrays run over positions. */
export interface RepeatPredictions {
  /** Fold that held the position out, −1 where none did. */
  fold: Int32Array;
  predicted: Float64Array;
  baseline: Float64Array;
}

/** A plan's outputs, by what they belong to. */
export class CollectedOutputs {
  private readonly byJob = new Map<string, ChunkOutput['values']>();

  /** `outputs` in any order; every chunk of the plan must be there. */
  constructor(
    private readonly plan: ReadoutPlan,
    outputs: readonly ChunkOutput[],
  ) {
    const values = new Map(outputs.map((output) => [output.id, output.values]));
    for (const chunk of plan.chunks) {
      const found = values.get(chunk.id);
      if (found === undefined) throw new RangeError(`chunk ${chunk.id} (${chunk.phase}) has no output`);
      this.byJob.set(JSON.stringify(chunk.job), found);
    }
  }

  /** The output of one job. */
  of(job: ReadoutPlan['chunks'][number]['job']): ChunkOutput['values'] {
    const found = this.byJob.get(JSON.stringify(job));
    if (found === undefined) throw new RangeError(`no output for ${JSON.stringify(job)}`);
    return found;
  }

  number(values: ChunkOutput['values'], name: string): number | null {
    const value = values[name];
    return typeof value === 'number' ? value : null;
  }

  array(values: ChunkOutput['values'], name: string): Float64Array {
    const value = values[name];
    if (!(value instanceof Float64Array)) throw new RangeError(`the output has no numbers “${name}”`);
    return value;
  }

  /** A task's held-out predictions, one entry a repeat. */
  predictions(task: number): RepeatPredictions[] {
    const set = this.plan.foldSets[this.plan.tasks[task].foldSet];
    const n = set.trials.length;
    const repeats = Array.from({ length: set.nRepeats }, () => ({
      fold: new Int32Array(n).fill(-1),
      predicted: new Float64Array(n),
      baseline: new Float64Array(n),
    }));
    set.splits.forEach((split, at) => {
      const values = this.of({ kind: 'observed', task, split: at });
      const predicted = this.array(values, 'predicted');
      const baseline = this.array(values, 'baseline');
      const repeat = repeats[split.repeat];
      split.test.forEach((position, i) => {
        repeat.fold[position] = split.fold;
        repeat.predicted[position] = predicted[i];
        repeat.baseline[position] = baseline[i];
      });
    });
    return repeats;
  }

  /** Held-out R² of every label draw of a task: pooled over folds, mean over repeats. */
  nullR2(task: number): Float64Array {
    const { draws, foldSet } = this.plan.tasks[task];
    const set = this.plan.foldSets[foldSet];
    const error = Array.from({ length: set.nRepeats }, () => new Float64Array(draws));
    const baseline = Array.from({ length: set.nRepeats }, () => new Float64Array(draws));
    for (const { job } of this.plan.chunks) {
      if (job.kind !== 'draws' || job.task !== task) continue;
      const values = this.of(job);
      const { repeat } = set.splits[job.split];
      this.array(values, 'error').forEach((e, i) => (error[repeat][job.from + i] += e));
      this.array(values, 'baseline').forEach((b, i) => (baseline[repeat][job.from + i] += b));
    }
    const r2 = new Float64Array(draws);
    for (let b = 0; b < draws; b++) {
      for (let repeat = 0; repeat < set.nRepeats; repeat++) {
        // Without spread about the baseline there is nothing to explain: such a draw counts as 0.
        const value = baseline[repeat][b] > 0 ? 1 - error[repeat][b] / baseline[repeat][b] : 0;
        r2[b] += value / set.nRepeats;
      }
    }
    return r2;
  }
}
