import type { Interval, Verdict } from '@/lib/contracts/readout';
import { formatCount } from '@/lib/format/format-count';
import { formatInterval } from '@/lib/format/format-interval';
import { formatNumber } from '@/lib/format/format-number';
import { formatP } from '@/lib/format/format-p';
import { decideVerdict, findExplanation } from './decide-verdict';
import type { VerdictControl, VerdictFacts, VerdictNull } from './verdict-facts';

const nb = '\u00a0';

/** "Sorrel’s MT and MST units". */
function whose(facts: VerdictFacts): string {
  const areas = facts.areas.length > 0 ? `${listWords(facts.areas)} ` : '';
  return `${facts.animal}’s ${areas}units`;
}

function listWords(words: string[]): string {
  return words.length < 2 ? words.join('') : `${words.slice(0, -1).join(', ')} and ${words.at(-1)}`;
}

function when({ startMs, endMs }: VerdictFacts['window']): string {
  return `from ${formatNumber(startMs, 0)} to${nb}${formatNumber(endMs, 0)}${nb}ms`;
}

function score(r2: number, interval: Interval): string {
  return `held-out R²${nb}is ${formatNumber(r2)}${nb}${formatInterval(interval)}`;
}

function shuffles(control: VerdictNull): string {
  return `${formatCount(control.draws)}${nb}shuffles${control.scheme === '' ? '' : ` ${control.scheme}`}`;
}

function pValue(control: VerdictNull): string {
  const least = control.p <= control.smallestP * (1 + 1e-9) ? ', the smallest that they allow' : '';
  return `(p${nb}=${nb}${formatP(control.p)}${least})`;
}

/** The gravest control that does not survive without explaining the readout, as a clause; else what the controls say together. */
function controlClause(facts: VerdictFacts): { text: string; strong: string[] } {
  const { controls } = facts;
  if (controls.length === 0) return { text: '', strong: [] };
  const failed = controls.find((control) => control.outcome === 'fails');
  if (failed) {
    const strong = `does not survive ${listWords(failed.subjects)}`;
    return { text: `; it ${strong}`, strong: [strong] };
  }
  const unsure = controls.filter((control) => control.outcome === 'cannotTell').length;
  const none = `and none of ${formatCount(controls.length)}${nb}controls explains it`;
  return {
    text: unsure > 0 ? `, ${none}, though ${formatCount(unsure)} cannot tell` : `, ${none}`,
    strong: [],
  };
}

/** What the units still say once the explanation has been taken into account. */
function whatIsLeft({ kind, r2, interval }: VerdictControl): string {
  if (r2 === null) return 'the units add nothing that can be told';
  const value = `${formatNumber(r2)}${interval ? `${nb}${formatInterval(interval)}` : ''}`;
  return kind === 'incremental' ? `the units add ${value}` : `R²${nb}${value} is left once that is taken out`;
}

/**
 * Writes the one sentence on top of a readout: who, what, when, how well, against what, and what it is not. The kind follows from
 * the numbers by `decideVerdict`; the words never claim that the brain uses the signal. `strong` holds the words that are the
 * answer, each a part of `sentence`.
 */
export function buildVerdict(facts: VerdictFacts): Verdict {
  const kind = decideVerdict(facts);
  const { r2, interval, label } = facts;
  const control = facts.null;
  if (r2 === null || interval === null) {
    const strong = 'cannot tell';
    return {
      kind,
      sentence: `These ${formatCount(facts.nTrials)}${nb}trials ${strong} whether ${whose(facts)} carry the ${label} ${when(facts.window)}: held-out R²${nb}cannot be worked out.`,
      strong: [strong],
    };
  }
  switch (kind) {
    case 'carries': {
      const strong = `carry the ${label}`;
      const clause = controlClause(facts);
      return {
        kind,
        sentence: `${whose(facts)} ${strong} ${when(facts.window)}: ${score(r2, interval)}, where ${shuffles(control!)} reached at most ${formatNumber(control!.max)} ${pValue(control!)}${clause.text}.`,
        strong: [strong, ...clause.strong],
      };
    }
    case 'explained': {
      const explanation = findExplanation(facts.controls)!;
      const { subjects } = explanation;
      const strong = `${listWords(subjects)} ${subjects.length === 1 ? 'explains' : 'explain'} it`;
      const alone = facts.controls.find((other) => other.kind === 'nuisanceOnly');
      const reach =
        alone?.r2 != null
          ? `nuisance variables alone reach ${formatNumber(alone.r2)}${alone.interval ? `${nb}${formatInterval(alone.interval)}` : ''} and `
          : '';
      const add = whatIsLeft(explanation);
      return {
        kind,
        sentence: `${whose(facts)} predict the ${label} ${when(facts.window)}, held-out R²${nb}${formatNumber(r2)}${nb}${formatInterval(interval)}, but ${strong}: ${reach}${add}.`,
        strong: [strong],
      };
    }
    case 'worse': {
      const strong = 'worse than guessing the mean';
      return {
        kind,
        sentence: `This readout of ${whose(facts)} ${when(facts.window)} is ${strong}: ${score(r2, interval)}. That speaks about this recipe (${formatCount(facts.nFeatures)}${nb}features, ${facts.estimatorWords}), not about the area.`,
        strong: [strong],
      };
    }
    case 'doesNot': {
      const strong = `do not carry the ${label}`;
      return {
        kind,
        sentence: `At this number of units and trials ${whose(facts)} ${strong} ${when(facts.window)}: ${score(r2, interval)}, where ${formatNumber(control!.q025)} to ${formatNumber(control!.q975)} is the middle 95${nb}% of ${shuffles(control!)} ${pValue(control!)}; anything above R²${nb}${formatNumber(interval.high)} would have shown.`,
        strong: [strong],
      };
    }
    case 'cannotTell':
      return cannotTell(facts, score(r2, interval));
  }
}

function cannotTell(facts: VerdictFacts, scored: string): Verdict {
  const strong = 'cannot tell';
  const control = facts.null;
  const start = `These ${formatCount(facts.nTrials)}${nb}trials ${strong} whether ${whose(facts)} carry the ${facts.label} ${when(facts.window)}: ${scored}`;
  let end: string;
  if (control === null) end = ', and no shuffled control was run.';
  else if (facts.labelTrends)
    end = `. The label drifts over the session, and no shuffle is a fair comparison for that ${pValue(control)}.`;
  else if (control.p <= 0.05)
    end = `; ${shuffles(control)} seldom reach that ${pValue(control)}, but the interval takes in 0.`;
  else end = `, and ${shuffles(control)} reach ${formatNumber(control.q95)} ${pValue(control)}.`;
  return { kind: 'cannotTell', sentence: start + end, strong: [strong] };
}
