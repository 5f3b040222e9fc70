import type { VerdictControl, VerdictFacts } from './verdict-facts';

export type VerdictKind = 'carries' | 'doesNot' | 'cannotTell' | 'explained' | 'worse';

/** The level of the test and of the intervals; common practice, no source. */
const level = 0.05;

/** Controls that say what else would explain a readout, when they fail. */
const explaining = new Set(['incremental', 'adjusted', 'matched', 'rateNormalised']);

/** The control that explains the readout away, the gravest first; null where none does. */
export function findExplanation(controls: VerdictControl[]): VerdictControl | null {
  return controls.find((control) => explaining.has(control.kind) && control.outcome === 'fails') ?? null;
}

/**
 * Decides what a readout says, from its numbers alone.
 *
 * worse: the interval of held-out R² ends below 0. carries: p ≤ .05 and the interval begins above 0. explained: as carries, but
 * a control that takes nuisance variables into account fails. doesNot: p > .05 and the interval excludes the smallest effect that
 * an analysis plan named. Everything else, a label with a trend included, is cannotTell.
 */
export function decideVerdict(facts: VerdictFacts): VerdictKind {
  const { r2, interval } = facts;
  if (r2 === null || interval === null) return 'cannotTell';
  if (interval.high < 0) return 'worse';
  if (facts.null === null || facts.labelTrends) return 'cannotTell';
  if (facts.null.p <= level && interval.low > 0)
    return findExplanation(facts.controls) ? 'explained' : 'carries';
  if (facts.null.p > level && facts.smallestEffect !== null && interval.high < facts.smallestEffect)
    return 'doesNot';
  return 'cannotTell';
}
