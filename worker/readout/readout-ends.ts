import type { ReadoutEnd } from '@/db/repositories/readout-claims';
import type { ReadoutRow } from '@/db/repositories/readouts';
import type { Problem } from '@/lib/contracts/problem';
import { buildResult } from '@/lib/services/readouts/build-result';
import type { ComputeOutcome } from '@/worker/compute/compute-pool';
import type { ComputeRequest } from '@/worker/compute/messages';

/** What a readout can come to, from what its compute process said. */
export const readoutEnds = {
  done(
    row: ReadoutRow,
    request: ComputeRequest,
    outcome: Extract<ComputeOutcome, { kind: 'done' }>,
    startedAt: Date,
  ): ReadoutEnd {
    const { counts, notes, areas, labelTrends, facts } = outcome;
    const { animal, dataHash, dataVersion } = request;
    const result = buildResult(row.recipe, outcome.numbers, { counts, notes, areas, animal, labelTrends });
    const finishedAt = new Date();
    return {
      state: 'done',
      result,
      predictionsKey: outcome.predictionsKey,
      provenance: {
        dataHash,
        dataVersion,
        recipeHash: row.recipeHash,
        seed: row.recipe.seed,
        ...facts,
        startedAt: startedAt.toISOString(),
        finishedAt: finishedAt.toISOString(),
        durationMs: finishedAt.getTime() - startedAt.getTime(),
        attempts: row.attempts,
      },
    };
  },

  failed: (problems: Problem[]): ReadoutEnd => ({ state: 'failed', problems, provenance: null }),

  interrupted: (times: number): ReadoutEnd =>
    readoutEnds.failed([
      {
        code: 'interrupted',
        severity: 'stops',
        message: `The computation was interrupted ${times} times and was given up.`,
        remedy:
          'If it is large, try a smaller one: the machine may be short of memory. Otherwise run it again.',
        place: {},
      },
    ]),

  internal: (): ReadoutEnd =>
    readoutEnds.failed([
      {
        code: 'internal',
        severity: 'stops',
        message: 'Something went wrong on our side; it has been logged with the id of this readout.',
        place: {},
      },
    ]),
};
