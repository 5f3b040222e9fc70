import type { CreateReadout, ReadoutEstimate } from '@/lib/contracts/readout';
import { planReadout } from '@/lib/engine/readout/plan-readout';
import { authorize } from '@/lib/services/authorize';
import type { Ctx } from '@/lib/services/context';
import { prepareRecipe } from '@/lib/services/readouts/prepare-recipe';
import { recipeProblems } from '@/lib/services/readouts/recipe-problems';

/** What a recipe would take on a session, and what is wrong with it, without making a readout. */
export async function estimateReadout(
  ctx: Ctx,
  input: CreateReadout & { sessionId: string },
): Promise<ReadoutEstimate> {
  authorize(ctx, 'readout.read');
  const { sessionId } = input;
  const { recipe, faults, resolved, subject } = await prepareRecipe(
    ctx.actor.labId,
    sessionId,
    input.recipe,
    sessionId,
  );
  const nothing = { recipe, seconds: null, bytes: null, trials: null, units: null };
  if (!resolved) return { ...nothing, problems: recipeProblems(faults) };
  const { binFrom, binTo } = resolved.bins;
  const sizes = { trials: resolved.counts.trialsUsed, units: resolved.counts.unitsUsed };
  const planned = planReadout({
    ...resolved.input,
    // The plan looks at the number of counts alone; memory that nobody writes to costs nothing.
    counts: new Uint8Array(resolved.input.nTrials * resolved.input.nUnits * (binTo - binFrom)),
    nBins: binTo - binFrom,
    windowStartMs: subject.windowStartMs + binFrom * subject.binWidthMs,
  });
  if (!planned.ok) return { ...nothing, ...sizes, problems: planned.problems };
  const { seconds, bytes } = planned.plan.estimate;
  return { recipe, seconds, bytes, ...sizes, problems: [...resolved.notes, ...planned.plan.warnings] };
}
