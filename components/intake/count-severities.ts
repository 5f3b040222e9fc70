import type { Problem } from '@/lib/contracts/problem';

/** How many problems stop, warn and note. */
export function countSeverities(problems: readonly Problem[]): {
  stops: number;
  warns: number;
  notes: number;
} {
  const count = { stops: 0, warns: 0, notes: 0 };
  for (const problem of problems) count[problem.severity] += 1;
  return count;
}
