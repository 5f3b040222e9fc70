import { createHash } from 'node:crypto';
import { v7 } from 'uuid';
import { addToOutbox } from '@/db/repositories/outbox';
import { findReadout, insertReadout, takeReadoutNumber } from '@/db/repositories/readouts';
import { inTransaction } from '@/db/transaction';
import { canonicalJson } from '@/lib/audit/canonical-json';
import { writeAudit } from '@/lib/audit/write-audit';
import type { CreateReadout, Readout } from '@/lib/contracts/readout';
import type { Recipe } from '@/lib/contracts/recipe';
import { publishLive } from '@/lib/jobs/publish-live';
import { authorize } from '@/lib/services/authorize';
import type { Ctx } from '@/lib/services/context';
import { pokeRelay } from '@/lib/services/outbox/poke-relay';
import { invalidRecipe } from '@/lib/services/readouts/invalid-recipe';
import { labelSequences } from '@/lib/services/readouts/label-sequences';
import { prepareRecipe, type PreparedRecipe } from '@/lib/services/readouts/prepare-recipe';
import { hashPermutations, writePermutations } from '@/lib/services/readouts/readout-inputs';
import { toReadout } from '@/lib/services/readouts/to-readout';
import { keys } from '@/storage/keys';
import { objectStore } from '@/storage/object-store';

/** Given permutations above this many entries leave the recipe's row for the object store. */
const maxInlineEntries = 20_000;

/**
 * A new readout of a session: fills the recipe, checks it at once, gives it the session's next number and queues it.
 * @throws AppError invalid-input with every fault and its pointer; conflict where the session has no data
 */
export async function createReadout(
  ctx: Ctx,
  input: CreateReadout & { sessionId: string },
): Promise<Readout> {
  authorize(ctx, 'readout.create');
  const { labId, userId } = ctx.actor;
  const { sessionId } = input;
  const id = v7();
  const prepared = await prepareRecipe(labId, sessionId, input.recipe, id);
  if (prepared.faults.length > 0) throw invalidRecipe(prepared.faults);
  const { recipe, recipeHash, inputs } = keepRecipe(prepared);
  const inputsKey = keys.readoutInputs(labId, sessionId, id);
  // Before the row: a row must never name an object that is not there. One that no row names is only a few bytes lost.
  if (inputs) await objectStore().put(inputsKey, inputs, 'application/vnd.apache.arrow.stream');

  const made = await inTransaction(async (trx) => {
    const number = await takeReadoutNumber(trx, labId, sessionId);
    await insertReadout(trx, {
      id,
      labId,
      sessionId,
      dataVersionId: prepared.subject.dataVersionId,
      number,
      recipe,
      recipeHash,
      inputsKey: inputs ? inputsKey : null,
      authorId: userId,
    });
    await addToOutbox(trx, { kind: 'run-readout', payload: { id } });
    const row = await findReadout(trx, labId, id);
    if (row === null) throw new Error('a readout that was just made is missing');
    await writeAudit(trx, ctx, {
      action: 'readout.create',
      subjectKind: 'readout',
      subjectId: id,
      detail: { sessionId, number, recipeHash },
    });
    return toReadout(row);
  });
  pokeRelay();
  void publishLive({ labId, kind: 'readout', sessionId, readoutId: id, state: 'queued', progress: null });
  return made;
}

/**
 * The recipe as its row keeps it, and what goes to the object store instead: long permutations, those of a file, which may
 * be removed some day, and the label sequences of other sessions, which may change. The hash covers the permutations' content, so it does not matter how they were sent.
 */
function keepRecipe({ recipe, permutations, sequences }: PreparedRecipe): {
  recipe: Recipe;
  recipeHash: string;
  inputs: Uint8Array | null;
} {
  const hashOf = (value: Recipe) => createHash('sha256').update(canonicalJson(value)).digest('hex');
  if (sequences) {
    const brief = { ...recipe, null: { ...recipe.null, inputsSha256: labelSequences.hash(sequences) } };
    return { recipe: brief, recipeHash: hashOf(brief), inputs: labelSequences.write(sequences) };
  }
  if (!permutations) return { recipe, recipeHash: hashOf(recipe), inputs: null };
  const { permutations: sent, ...scheme } = recipe.null;
  const inputsSha256 = hashPermutations(permutations);
  const brief = { ...recipe, null: { ...scheme, inputsSha256 } };
  const recipeHash = hashOf(brief);
  const isInline = Array.isArray(sent);
  if (isInline && permutations.values.length <= maxInlineEntries) return { recipe, recipeHash, inputs: null };
  return {
    recipe: isInline ? brief : { ...brief, null: { ...brief.null, permutations: sent } },
    recipeHash,
    inputs: writePermutations(permutations),
  };
}
