import type { RecipeFacts } from '@/components/recipe/recipe-facts';
import { correlate } from '@/components/session/correlate';
import type { NuisanceColumn } from '@/lib/contracts/recipe';

/**
 * Trial columns that could explain a readout: all but labels, blocks, columns without spread or with gaps, names with
 * many values, and columns that only number the trials (trial order has a control of its own). At most eight.
 */
export function proposeNuisances(facts: RecipeFacts, label: string): NuisanceColumn[] {
  const labels = new Set([label, ...facts.labels.map((entry) => entry.column)]);
  const columns = facts.trialColumns.flatMap(({ name, type, values }): NuisanceColumn[] => {
    if (labels.has(name) || name === facts.blockColumn) return [];
    const distinct = new Set(values);
    // Trials that lack a nuisance would be dropped: that is for a member to decide.
    if (distinct.size < 2 || distinct.has(null)) return [];
    if (type === 'category') return distinct.size <= 12 ? [{ column: name, term: 'category' }] : [];
    const order = correlate(
      values.map((value) => (typeof value === 'number' ? value : null)),
      values.map((_, trial) => trial),
    );
    return order.r !== null && Math.abs(order.r) > 0.98 ? [] : [{ column: name, term: 'linear' }];
  });
  return columns.slice(0, 8);
}
