import type { Problem } from '@/lib/contracts/problem';
import { checkBins } from '@/lib/intake/checks/check-bins';
import { checkConfounds } from '@/lib/intake/checks/check-confounds';
import { checkCounts } from '@/lib/intake/checks/check-counts';
import { checkLabels } from '@/lib/intake/checks/check-labels';
import { checkTrialTable } from '@/lib/intake/checks/check-trial-table';
import { checkUnitTable } from '@/lib/intake/checks/check-unit-table';
import type { SessionData } from '@/lib/intake/session-data';

/** What the checks cannot see in the data themselves. */
export interface CheckFacts {
  /** The stored type of the counts array; null for tables. */
  arrayType: string | null;
  longWithoutShape: boolean;
}

/** All checks of a whole session; those that stop come first. Indices in places count from 0. */
export function checkSession(data: SessionData, facts: CheckFacts): Problem[] {
  const problems = [
    ...checkLabels(data),
    ...checkTrialTable(data),
    ...checkUnitTable(data),
    ...checkCounts(data, facts.arrayType),
    ...checkBins(data, facts.longWithoutShape),
    ...checkConfounds(data),
  ];
  const rank = { stops: 0, warns: 1, notes: 2 };
  return problems.sort((a, b) => rank[a.severity] - rank[b.severity]);
}
