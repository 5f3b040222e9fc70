import type { Recipe } from '@/lib/contracts/recipe';
import type { NullSpec } from '@/lib/engine/readout/types';
import { codeLevels } from '@/lib/services/readouts/code-levels';
import type { RecipeFault } from '@/lib/services/readouts/recipe-fault';
import type { SessionTables } from '@/lib/services/readouts/session-tables';

/** What a null takes beside its recipe, wherever it was kept. */
export interface NullInputs {
  /** Given permutations of the included trials. */
  permutations?: readonly ArrayLike<number>[];
  /** Label sequences of other sessions. */
  sequences?: readonly Float64Array[];
}

/** Which optional fields each kind reads; the others must be left out. */
const fields: Record<Recipe['null']['kind'], string[]> = {
  none: [],
  free: ['draws'],
  within: ['draws', 'column'],
  groups: ['draws', 'column'],
  circularShift: ['draws'],
  sessions: ['draws', 'inputsSha256'],
  given: ['draws', 'permutations', 'inputsSha256'],
};

/**
 * The shuffled control as the engine takes it, or what is wrong with it.
 */
export function resolveNull(
  recipe: Recipe,
  tables: SessionTables,
  nIncluded: number,
  { permutations, sequences }: NullInputs,
): { nullScheme: NullSpec } | { faults: RecipeFault[] } {
  const scheme = recipe.null;
  const stray = Object.entries(scheme).find(
    ([name, value]) => name !== 'kind' && value !== undefined && !fields[scheme.kind].includes(name),
  );
  if (stray)
    return one(
      `/recipe/null/${stray[0]}`,
      'not-for-this-kind',
      `“${stray[0]}” does not apply to a shuffled control of the kind “${scheme.kind}”.`,
    );
  const draws = scheme.draws ?? 1_000;
  switch (scheme.kind) {
    case 'none':
      return { nullScheme: { kind: 'none' } };
    case 'free':
    case 'circularShift':
      return { nullScheme: { kind: scheme.kind, draws } };
    case 'within':
    case 'groups': {
      const column = tables.trials.find(({ name }) => name === scheme.column);
      if (!column)
        return one('/recipe/null/column', 'required', 'Name the trial column that the shuffles keep to.');
      return { nullScheme: { kind: scheme.kind, codes: codeLevels(column).codes, draws } };
    }
    case 'sessions':
      if (!sequences?.length)
        return one(
          '/recipe/null/kind',
          'no-other-sessions',
          `No other session of this study has the label “${recipe.label}” as numbers.`,
        );
      if (scheme.draws !== undefined && scheme.draws !== sequences.length)
        return one(
          '/recipe/null/draws',
          'length',
          `There are ${sequences.length} other sessions, each one draw, not ${scheme.draws}.`,
        );
      return { nullScheme: { kind: 'sessions', sequences: [...sequences] } };
    case 'given':
      return given(permutations, nIncluded, scheme.draws);
  }
}

function given(
  permutations: readonly ArrayLike<number>[] | undefined,
  nIncluded: number,
  draws: number | undefined,
): { nullScheme: NullSpec } | { faults: RecipeFault[] } {
  const pointer = '/recipe/null/permutations';
  if (!permutations) return one(pointer, 'required', 'A given null needs its permutations.');
  if (draws !== undefined && draws !== permutations.length)
    return one(
      '/recipe/null/draws',
      'length',
      `There are ${permutations.length} permutations, not ${draws}.`,
    );
  const seen = new Int32Array(nIncluded).fill(-1);
  const rows: Int32Array[] = [];
  for (let b = 0; b < permutations.length; b++) {
    const row = permutations[b];
    if (row.length !== nIncluded)
      return one(
        `${pointer}/${b}`,
        'length',
        `Row ${b} has ${row.length} entries, but ${nIncluded} trials take part; rows index the trials that take part, in session order.`,
      );
    for (let i = 0; i < nIncluded; i++) {
      const index = row[i];
      if (!Number.isInteger(index) || index < 0 || index >= nIncluded)
        return one(
          `${pointer}/${b}/${i}`,
          'range',
          `${index} is not an index of the ${nIncluded} trials that take part.`,
        );
      if (seen[index] === b)
        return one(
          `${pointer}/${b}/${i}`,
          'repeated',
          `Row ${b} names trial ${index} twice, so it is no permutation.`,
        );
      seen[index] = b;
    }
    rows.push(Int32Array.from(row));
  }
  return { nullScheme: { kind: 'given', permutations: rows } };
}

function one(pointer: string, code: string, message: string): { faults: RecipeFault[] } {
  return { faults: [{ pointer, code, message }] };
}
