'use client';
import { Figure } from '@/components/charts/figure';
import { UnitDots } from '@/components/charts/unit-dots';
import type { WeightNumbers } from '@/components/readout/view-numbers';
import { numbers } from '@/components/ui/numbers';
import { formatNumber } from '@/lib/format/format-number';

/** Weights beside patterns of the units with the largest patterns. With several bins a unit, its largest bin stands for it. */
export function WeightsFigure({
  view,
  isRoot,
  fileName,
}: {
  view: WeightNumbers;
  /** Features are square roots of counts, not rates. */
  isRoot: boolean;
  fileName: string;
}) {
  const { featuresPerUnit, weights, pattern } = view;
  const all = view.units.map((unit, index) => {
    let best = index * featuresPerUnit;
    for (let f = best; f < (index + 1) * featuresPerUnit; f += 1)
      if (Math.abs(pattern.mean[f]) > Math.abs(pattern.mean[best])) best = f;
    return { unit, feature: best };
  });
  const shown = [...all]
    .sort((a, b) => Math.abs(pattern.mean[b.feature]) - Math.abs(pattern.mean[a.feature]))
    .slice(0, 26);
  const panel = (title: string, side: WeightNumbers['weights']) => ({
    title,
    rows: shown.map(({ unit, feature }) => ({
      name: String(unit + 1),
      value: side.mean[feature],
      spread: side.sd[feature],
      isFilled: true,
    })),
  });
  const bins = featuresPerUnit > 1 ? ' Of each unit, the bin with the largest pattern.' : '';
  return (
    <Figure
      title="Weights and patterns"
      caption={numbers(
        `The ${shown.length} units with the largest patterns (Haufe et al. 2014).${bins} Mean over the ${view.folds} readouts; lines: ±1 SD over them, which share training trials. A weight says how the readout uses a unit; only the pattern says how the unit follows the label. Agreement between folds: weights r ${formatNumber(weights.agreement)}, patterns r ${formatNumber(pattern.agreement)}. Fitted on training trials.${isRoot ? ' Features are square roots of counts (Anscombe).' : ''}`,
      )}
      columns={[
        { name: 'unit' },
        ...(featuresPerUnit > 1 ? [{ name: 'bin' }] : []),
        { name: 'weight', decimals: 5 },
        { name: 'weight SD', decimals: 5 },
        { name: 'pattern', decimals: 4 },
        { name: 'pattern SD', decimals: 4 },
      ]}
      rows={view.units.flatMap((unit, index) =>
        Array.from({ length: featuresPerUnit }, (_, bin) => {
          const f = index * featuresPerUnit + bin;
          return [
            unit + 1,
            ...(featuresPerUnit > 1 ? [bin + 1] : []),
            weights.mean[f],
            weights.sd[f],
            pattern.mean[f],
            pattern.sd[f],
          ];
        }),
      )}
      fileName={`${fileName}-weights`}
    >
      <UnitDots
        name="Weights and patterns of units"
        panels={[
          panel('weight, label per spike/s', weights),
          panel('pattern, spikes/s per 1 of label', pattern),
        ]}
      />
    </Figure>
  );
}
