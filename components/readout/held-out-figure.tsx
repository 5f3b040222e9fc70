'use client';
import { useMemo } from 'react';
import { Figure } from '@/components/charts/figure';
import { HeldOutScatter, type ScatterTrial } from '@/components/charts/held-out-scatter';
import type { ScatterLevel } from '@/components/charts/scatter-painter';
import { numbers } from '@/components/ui/numbers';

/** Held-out against true with its caption, table and downloads. */
export function HeldOutFigure({
  trials,
  levels,
  label,
  caption,
  guess,
  fileName,
}: {
  trials: readonly ScatterTrial[];
  levels: readonly ScatterLevel[];
  label: string;
  caption: string;
  guess: number | null;
  fileName: string;
}) {
  const rows = useMemo(
    () =>
      trials.map((row) => [row.trial + 1, row.fold + 1, row.label, row.predicted, row.predicted - row.label]),
    [trials],
  );
  return (
    <Figure
      title="Held-out against true"
      caption={numbers(caption)}
      columns={[
        { name: 'trial' },
        { name: 'fold' },
        { name: 'true', decimals: 3 },
        { name: 'held-out', decimals: 3 },
        { name: 'residual', decimals: 3 },
      ]}
      rows={rows}
      fileName={`${fileName}-held-out`}
    >
      <HeldOutScatter trials={trials} levels={levels} label={label} guess={guess} />
    </Figure>
  );
}
