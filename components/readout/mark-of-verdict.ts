import type { IntervalMark } from '@/components/charts/interval-glyph';
import type { Verdict } from '@/lib/contracts/readout';

/** The glyph that a verdict is drawn with. */
export function markOfVerdict(kind: Verdict['kind'] | null): IntervalMark {
  if (kind === 'carries') return 'carried';
  if (kind === 'explained') return 'explained';
  if (kind === 'worse') return 'worse';
  return 'open';
}
