'use client';
import { Figure } from '@/components/charts/figure';
import { UnitDots } from '@/components/charts/unit-dots';
import type { SingleUnitNumbers } from '@/components/readout/view-numbers';
import { numbers } from '@/components/ui/numbers';

/** R² of readouts from one unit at a time, largest first, with corrected p values. */
export function SingleUnitsFigure({ view, fileName }: { view: SingleUnitNumbers; fileName: string }) {
  const sorted = [...view.units].sort((a, b) => (b.r2 ?? -Infinity) - (a.r2 ?? -Infinity));
  const rows = sorted.slice(0, 26).map((row) => ({
    name: String(row.unit + 1),
    value: row.r2 ?? 0,
    spread: null,
    isFilled: row.pFamily !== null && row.pFamily <= 0.05,
  }));
  const told = view.units.filter((row) => row.pFamily !== null && row.pFamily <= 0.05).length;
  const q = view.units.filter((row) => row.q !== null && row.q <= 0.05).length;
  return (
    <Figure
      title="Single units"
      caption={numbers(
        `Held-out R² of readouts from one unit each, same folds; the ${rows.length} largest of ${view.units.length}. Filled: above the shuffles’ largest value over all units (family-wise p at most 0.05): ${told} units. By the false discovery rate (Benjamini and Hochberg, 0.05): ${q} units.`,
      )}
      columns={[
        { name: 'unit' },
        { name: 'R²', decimals: 4 },
        { name: 'p', decimals: 4 },
        { name: 'family-wise p', decimals: 4 },
        { name: 'q', decimals: 4 },
      ]}
      rows={sorted.map((row) => [row.unit + 1, row.r2, row.p, row.pFamily, row.q])}
      fileName={`${fileName}-single-units`}
    >
      <UnitDots panels={[{ title: 'R², held-out', rows }]} name="R² of single units" />
    </Figure>
  );
}
