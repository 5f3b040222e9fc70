import { estimateCost } from '@/lib/engine/readout/estimate-cost';
import type { Chunk, ChunkJob, FoldSet, ReadoutInput, Task } from '@/lib/engine/readout/types';

/** Flops of a chunk of label draws, so that progress and cancelling come at least twice a second. */
const CHUNK_FLOPS = 1.5e10;
const MOST_DRAWS_A_CHUNK = 256;
const FEWEST_DRAWS_A_CHUNK = 32;
/** Flops of a chunk of small analyses. */
const BATCH_FLOPS = 4e9;

/** Gathers tasks and chunks while a readout is planned. */
export class PlanBuilder {
  readonly foldSets: FoldSet[] = [];
  readonly tasks: Task[] = [];
  readonly chunks: Chunk[] = [];
  /** Largest memory of a single fit, in bytes. */
  fitBytes = 0;

  constructor(private readonly input: ReadoutInput) {}

  addFoldSet(set: FoldSet): number {
    this.foldSets.push(set);
    return this.foldSets.length - 1;
  }

  addTask(task: Task): number {
    this.tasks.push(task);
    return this.tasks.length - 1;
  }

  addChunk(phase: string, weight: number, affinity: string, job: ChunkJob): void {
    this.chunks.push({ id: this.chunks.length, phase, weight, affinity, job });
  }

  /** Number of features of a task. */
  nFeatures(task: Task): number {
    const { features } = task;
    if (features.kind === 'none') return 0;
    if (features.kind === 'totalRate' || features.kind === 'trialOrder') return 1;
    const { unitIndex, binWidthMs } = this.input;
    const units =
      'all' in features.units ? unitIndex.length : 'one' in features.units ? 1 : features.units.subset.size;
    const isBins =
      features.kind === 'bins' || (features.kind === 'rateNormalised' && this.input.features === 'bins');
    const width = Math.round((features.window.endMs - features.window.startMs) / binWidthMs);
    return units * (isBins ? width : 1);
  }

  cost(task: Task, nTrain: number, nTest: number): { fit: number; label: number; bytes: number } {
    const cost = estimateCost(
      task.design.kind === 'nuisanceOnly' ? { kind: 'leastSquares' } : this.input.estimator,
      task.trainLimit === undefined ? nTrain : Math.min(nTrain, task.trainLimit.size),
      nTest,
      Math.max(1, this.nFeatures(task)),
    );
    this.fitBytes = Math.max(this.fitBytes, cost.bytes);
    return cost;
  }

  /** Observed predictions and, where the task has draws, tiles of label draws for every split. */
  addSplitChunks(taskIndex: number, phase: string, drawsPhase: string): void {
    const task = this.tasks[taskIndex];
    this.foldSets[task.foldSet].splits.forEach((split, at) => {
      const cost = this.cost(task, split.train.length, split.test.length);
      const affinity = `task ${taskIndex} split ${at}`;
      this.addChunk(phase, cost.fit + cost.label, affinity, { kind: 'observed', task: taskIndex, split: at });
      const size = this.drawsAChunk(cost.label);
      for (let from = 0; from < task.draws; from += size) {
        const to = Math.min(task.draws, from + size);
        this.addChunk(drawsPhase, (to - from) * cost.label, affinity, {
          kind: 'draws',
          task: taskIndex,
          split: at,
          from,
          to,
        });
      }
    });
  }

  /** Chunks of small analyses: tasks from…to, each over all its splits. */
  addBatchChunks(from: number, to: number, phase: string): void {
    let start = from;
    let weight = 0;
    for (let index = from; index < to; index++) {
      const task = this.tasks[index];
      for (const split of this.foldSets[task.foldSet].splits) {
        const cost = this.cost(task, split.train.length, split.test.length);
        weight += cost.fit + cost.label;
      }
      if (weight >= BATCH_FLOPS || index === to - 1) {
        this.addChunk(phase, weight, `batch ${start}`, { kind: 'batch', from: start, to: index + 1 });
        start = index + 1;
        weight = 0;
      }
    }
  }

  private drawsAChunk(flopsALabel: number): number {
    const wanted = Math.floor(CHUNK_FLOPS / Math.max(1, flopsALabel));
    return Math.max(FEWEST_DRAWS_A_CHUNK, Math.min(MOST_DRAWS_A_CHUNK, wanted));
  }
}
