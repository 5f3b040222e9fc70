'use client';
import { useMemo } from 'react';
import { Figure } from '@/components/charts/figure';
import { NullHistogram } from '@/components/charts/null-histogram';
import { numbers } from '@/components/ui/numbers';
import type { ReadoutResult } from '@/lib/contracts/readout';
import { formatCount } from '@/lib/format/format-count';
import { formatP } from '@/lib/format/format-p';

/** The shuffled control as a histogram with the observed value, its p and what they rest on. */
export function NullFigure({
  result,
  scheme,
  chosen,
  fileName,
}: {
  result: ReadoutResult;
  scheme: string;
  /** Whether a penalty or number of components was chosen again in every draw. */
  chosen: boolean;
  fileName: string;
}) {
  const values = useMemo(() => result.null?.values ?? [], [result]);
  const rows = useMemo(() => values.map((value, draw) => [draw + 1, value]), [values]);
  const control = result.null;
  if (!control) return null;
  const { quantiles } = control;
  const least =
    control.smallestP === null
      ? ''
      : ` ${formatP(control.smallestP)} is the smallest that ${formatCount(control.draws)} draws allow.`;
  const caption =
    `Held-out R² of the readout and of ${formatCount(control.draws)} label shuffles ${scheme}, folds fixed${chosen ? ', the choice of penalty repeated each time' : ''}. ` +
    `${control.exceedances === 0 ? 'None' : formatCount(control.exceedances)} reached it: p = ${formatP(control.p)}, one-sided.${least} ` +
    `Line at the observed value: 95 % interval by nested cross-validation; it covers readouts fitted like these, not another session or animal.`;
  return (
    <Figure
      title="Shuffled control"
      caption={numbers(caption)}
      columns={[{ name: 'draw' }, { name: 'R², held-out', decimals: 4 }]}
      rows={rows}
      fileName={`${fileName}-shuffles`}
    >
      <NullHistogram
        values={values}
        scheme={scheme}
        observed={result.heldOut.r2}
        interval={result.heldOut.r2Interval}
        q95={quantiles.q95}
        largest={quantiles.max}
      />
    </Figure>
  );
}
