import type { Problem } from '@/lib/contracts/problem';
import type { Recipe } from '@/lib/contracts/recipe';
import type { ChunkOutput, ReadoutInput, ReadoutNumbers, ReadoutPlan } from '@/lib/engine/readout/types';
import type { PartRecord } from '@/lib/intake/canonical/part-record';
import type { ResolvedRecipe } from '@/lib/services/readouts/resolve-recipe';

/** Everything that a compute child needs to know of a readout; the data itself it reads from the object store. */
export interface ComputeRequest {
  labId: string;
  sessionId: string;
  readoutId: string;
  /** The animal's code, for the verdict. */
  animal: string;
  dataVersion: number;
  recipe: Recipe;
  /** Where given permutations lie, if they were too long for the recipe. */
  inputsKey: string | null;
  dataHash: string;
  parts: PartRecord[];
  shape: { nTrials: number; nUnits: number; nBins: number; binWidthMs: number; windowStartMs: number };
  excludedTrials: number[];
  excludedUnits: number[];
  /** The most that this readout may hold in memory. */
  maxBytes: number;
  /** Outputs of chunks that an earlier attempt finished, each as `encodeOutput` made it. */
  finished: Uint8Array[];
  /** Send finished chunks back to be kept when the plan expects to take longer than this. */
  keepPartsAboveSeconds: number;
  scope: ComputeScope;
}

/** How much of a readout to do. */
export type ComputeScope =
  /** All of it, unless it is expected to take longer than `splitAboveSeconds`: then only say into how many parts. */
  | { kind: 'all'; splitAboveSeconds: number | null }
  /** One part's chunks; their outputs are sent back and nothing is put together. */
  | { kind: 'part'; part: number; parts: number };

export interface ComputeProgress {
  /** Work done and all of it, in thousandths. */
  done: number;
  total: number;
  phase: string;
  secondsLeft: number | null;
}

/** Facts about how the numbers were made, for the record. */
export interface ComputeFacts {
  engineVersion: string;
  backend: string;
  coreType: string;
  libraries: Record<string, string>;
  computeMs: number;
}

/** From the worker to a compute child. */
export interface ToChild {
  kind: 'run';
  request: ComputeRequest;
}

/** From a compute child to the worker. */
export type FromChild =
  | { kind: 'ready' }
  | { kind: 'progress'; progress: ComputeProgress }
  /** How many chunks the plan has. */
  | { kind: 'planned'; chunks: number }
  | { kind: 'part'; chunk: number; payload: Uint8Array }
  | { kind: 'problems'; problems: Problem[] }
  | {
      kind: 'done';
      numbers: Omit<ReadoutNumbers, 'predictions' | 'trialsUsed'>;
      counts: ResolvedRecipe['counts'];
      notes: Problem[];
      areas: string[];
      labelTrends: boolean;
      predictionsKey: string;
      facts: ComputeFacts;
    }
  | { kind: 'split'; parts: number }
  | { kind: 'partDone'; chunks: number }
  | { kind: 'error'; message: string; code: string | null };

/** From a compute child to one of its threads. */
export type ToThread =
  | { kind: 'load'; input: ReadoutInput; plan: ReadoutPlan; cacheBytes: number }
  | { kind: 'chunk'; id: number };

/** From a thread to its compute child. */
export type FromThread =
  | { kind: 'ready'; backend: string; description: string }
  | { kind: 'output'; output: ChunkOutput }
  | { kind: 'error'; chunk: number | null; message: string; problem: Problem | null };
