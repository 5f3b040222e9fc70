import { naturalSplineColumns } from '@/lib/engine/nuisance/natural-spline-columns';
import type { NuisanceTerm } from '@/lib/engine/nuisance/nuisance-design';

/**
 * One trial's columns for one fitted term, before centring; null for a category level that no training trial had.
 *
 * linear: z; quadratic: z, z²; spline: natural cubic spline; circular: cos and sin of 2π·value/period;
 * category: one indicator a level but the first. z = (value − mean)/sd of the training trials.
 * Shapes: a finite `value` → columns. Mutates nothing. Cost: O(columns). Source: definitions in docs of each term.
 */
export function termColumns(term: NuisanceTerm, value: number): number[] | null {
  switch (term.kind) {
    case 'constant':
      return [];
    case 'linear':
      return [(value - term.mean) / term.sd];
    case 'quadratic': {
      const z = (value - term.mean) / term.sd;
      return [z, z * z];
    }
    case 'spline':
      return naturalSplineColumns(value, term.knots);
    case 'circular': {
      const angle = (2 * Math.PI * value) / term.periodDeg;
      return [Math.cos(angle), Math.sin(angle)];
    }
    case 'category': {
      const at = term.levels.indexOf(value);
      if (at < 0) return null;
      return term.levels.slice(1).map((_, j) => (j + 1 === at ? 1 : 0));
    }
  }
}
