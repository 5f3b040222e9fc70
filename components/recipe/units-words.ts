import { conditionWords } from '@/components/recipe/condition-words';
import type { Recipe } from '@/lib/contracts/recipe';
import { formatValue } from '@/lib/format/format-value';

/** The rule or list by which units were taken, in brackets after their number; empty for all units. */
export function unitsWords(units: Recipe['units']): string {
  if ('all' in units) return '';
  if ('ids' in units) return 'by a list';
  const { minRateHz, minPresence, where } = units.rule;
  return [
    minRateHz === undefined ? '' : `rate at least ${formatValue(minRateHz)} spikes/s`,
    minPresence === undefined ? '' : `presence at least ${formatValue(minPresence)}`,
    ...(where ?? []).map(conditionWords),
  ]
    .filter((part) => part !== '')
    .join(', ');
}
