import type { Condition } from '@/lib/contracts/recipe';

const ops: Record<Condition['op'], string> = {
  '=': 'is',
  '!=': 'is not',
  '<': 'below',
  '<=': 'at most',
  '>': 'above',
  '>=': 'at least',
  in: 'is one of',
};

/** One condition on a column in words: "speed at least 2". */
export function conditionWords({ column, op, value }: Condition): string {
  return `${column} ${ops[op]} ${Array.isArray(value) ? value.join(', ') : value}`;
}
