import { labelWords } from '@/components/recipe/label-words';
import type { UnitRow } from '@/components/session/unit-row';
import type { ExclusionList, Session } from '@/lib/contracts/session';
import { formatCount } from '@/lib/format/format-count';
import { formatNumber } from '@/lib/format/format-number';
import { formatValue } from '@/lib/format/format-value';

function areasOf(units: readonly UnitRow[], place: number): string {
  if (place < 0) return '';
  const counts = new Map<string, number>();
  for (const unit of units) {
    const area = unit.values[place];
    if (typeof area === 'string') counts.set(area, (counts.get(area) ?? 0) + 1);
  }
  return [...counts].map(([area, count]) => `${area} ${formatCount(count)}`).join(', ');
}

/** The line of facts that says what a session is. `areaPlace` is the place of the area column in the units' values, −1 for none. */
export function sessionFacts(
  session: Session,
  exclusions: ExclusionList,
  units: readonly UnitRow[],
  areaPlace: number,
): { term: string; value: string }[] {
  const { trials, bins, binWidthMs, windowStartMs } = session;
  const nUnits = session.units ?? 0;
  const outTrials = exclusions.excludedTrials.length;
  const outUnits = exclusions.excludedUnits.length;
  const of = (all: number, out: number): string =>
    out === 0 ? formatCount(all) : `${formatCount(all - out)} of ${formatCount(all)}`;
  const span =
    bins === null || binWidthMs === null || windowStartMs === null
      ? ''
      : `${formatCount(bins)} of ${formatValue(binWidthMs)} ms, ${formatNumber(windowStartMs, 0)} to ${formatNumber(windowStartMs + bins * binWidthMs, 0)}`;
  return [
    { term: 'areas', value: areasOf(units, areaPlace) },
    { term: 'trials', value: trials === null ? '' : of(trials, outTrials) },
    { term: 'units', value: of(nUnits, outUnits) },
    { term: 'bins', value: span },
    { term: 'labels', value: session.labels.map((label) => labelWords(label.column)).join(', ') },
    {
      term: 'data',
      value:
        session.dataVersion === null ? '' : `v${session.dataVersion} ${session.dataHash?.slice(0, 8) ?? ''}…`,
    },
  ];
}
