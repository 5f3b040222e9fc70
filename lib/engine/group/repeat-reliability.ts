import { EngineError } from '@/lib/engine/engine-error';
import { iccInterval } from '@/lib/engine/label/icc-interval';
import type { Interval } from '@/lib/engine/measures/interval';
import { requireLevel } from '@/lib/engine/measures/require-level';
import { requireNumbers } from '@/lib/engine/measures/require-numbers';

/** How alike values are that should repeat. */
export interface RepeatReliability {
  /** ICC(1); may be negative. */
  icc: number;
  interval: Interval | null;
  varianceBetween: number;
  varianceWithin: number;
  nGroups: number;
  /** Repeats a group, averaged so that unequal groups are allowed for (n₀). */
  repeats: number;
}

/**
 * Reliability over repeats: ICC(1) of values (held-out predictions) over trials that repeat the same thing.
 *
 * Groups of size nᵢ, N = Σnᵢ, G groups: n₀ = (N − Σnᵢ²/N)/(G − 1); ICC = (MSB − MSW)/(MSB + (n₀ − 1)MSW); variance between
 * (MSB − MSW)/n₀, within MSW. Interval: F-based with n₀ (exact for equal groups).
 * Shapes: `values` n; `group` n codes; trials alone in their group are left out. Mutates nothing. Returns null for fewer than 2 groups
 * with repeats, or when nothing varies. Throws EngineError on unequal lengths or values that are not finite. Cost: O(n log n).
 * Source: Shrout & Fleiss, Psychol. Bull. 1979; unequal groups: Donner, Int. Stat. Rev. 1986 (from memory).
 */
export function repeatReliability(
  values: ArrayLike<number>,
  group: ArrayLike<number>,
  level = 0.95,
): RepeatReliability | null {
  requireLevel(level);
  requireNumbers('A value', values);
  if (group.length !== values.length) {
    throw new EngineError(
      'shapeMismatch',
      `${group.length} group codes stand beside ${values.length} values`,
    );
  }
  const members = new Map<number, number[]>();
  for (let i = 0; i < values.length; i += 1) {
    const rows = members.get(group[i]);
    if (rows) rows.push(values[i]);
    else members.set(group[i], [values[i]]);
  }
  const groups = Array.from(members.values()).filter((rows) => rows.length > 1);
  if (groups.length < 2) return null;
  const all = groups.flat();
  const grand = all.reduce((sum, x) => sum + x, 0) / all.length;
  const scale = all.reduce((most, x) => Math.max(most, Math.abs(x)), 0);
  let between = 0;
  let within = 0;
  let sizes2 = 0;
  for (const rows of groups) {
    const centre = rows.reduce((sum, x) => sum + (x - grand), 0) / rows.length;
    between += rows.length * centre * centre;
    within += rows.reduce((sum, x) => sum + (x - grand - centre) ** 2, 0);
    sizes2 += rows.length * rows.length;
  }
  const rounding = (4 * Number.EPSILON * scale) ** 2 * all.length;
  const dfBetween = groups.length - 1;
  const dfWithin = all.length - groups.length;
  const msb = between <= rounding ? 0 : between / dfBetween;
  const msw = within <= rounding ? 0 : within / dfWithin;
  const repeats = (all.length - sizes2 / all.length) / dfBetween;
  const spread = msb + (repeats - 1) * msw;
  if (!(spread > 0) || !Number.isFinite(spread)) return null;
  return {
    icc: (msb - msw) / spread,
    interval: iccInterval(msb, msw, dfBetween, dfWithin, repeats, level, 'F, ICC(1) over repeats'),
    varianceBetween: (msb - msw) / repeats,
    varianceWithin: msw,
    nGroups: groups.length,
    repeats,
  };
}
