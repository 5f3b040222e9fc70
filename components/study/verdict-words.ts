import type { IntervalMark } from '@/components/charts/interval-glyph';
import type { ReadoutSummary } from '@/lib/contracts/readout';

type VerdictKind = NonNullable<ReadoutSummary['verdictKind']>;

/** A verdict in a table cell: its words, their class (colour only for what wants a person), and the mark of its interval. */
export const verdictWords: Record<VerdictKind, { text: string; className: string; mark: IntervalMark }> = {
  carries: { text: 'carries', className: 'say', mark: 'carried' },
  doesNot: { text: 'does not carry', className: 'say', mark: 'open' },
  cannotTell: { text: 'cannot tell', className: 'say', mark: 'open' },
  explained: { text: 'a nuisance explains it', className: 'w-warn', mark: 'explained' },
  worse: { text: 'worse than the mean', className: 'w-not', mark: 'worse' },
};
