'use client';
import { useMemo } from 'react';
import { chartNumber } from '@/components/charts/chart-number';
import { Figure } from '@/components/charts/figure';
import { labelBars } from '@/components/session/label-bars';
import { LabelHistogram } from '@/components/session/label-histogram';
import { lagOne } from '@/components/session/lag-one';
import { OrderPlot } from '@/components/session/order-plot';
import { numbers } from '@/components/ui/numbers';
import { formatPlural } from '@/lib/format/format-plural';

/** Distribution of the label, and label and rate against trial order, over the trials that are in. */
export function LabelFigures({
  label,
  values,
  rateHz,
  excluded,
  fileName,
}: {
  label: string;
  values: readonly (number | null)[];
  rateHz: readonly (number | null)[];
  excluded: readonly number[];
  fileName: string;
}) {
  const included = useMemo(() => {
    const out = new Set(excluded);
    return values.map((value, trial) => (out.has(trial) ? null : value));
  }, [values, excluded]);
  const present = useMemo(() => included.filter((value) => value !== null), [included]);
  const { bars, isLevels } = useMemo(() => labelBars(present), [present]);
  const missing = values.filter((value) => value === null).length;
  const lag = lagOne(included);
  const rateLag = lagOne(rateHz);
  const orderRows = useMemo(
    () =>
      values.map((value, trial) => [
        trial + 1,
        value,
        rateHz[trial] ?? null,
        excluded.includes(trial) ? 'left out' : '',
      ]),
    [values, rateHz, excluded],
  );
  return (
    <div className="figs" style={{ gridTemplateColumns: 'minmax(0, 1fr) minmax(0, 2fr)' }}>
      <Figure
        title={`Distribution of ${label}`}
        caption={numbers(
          `${label} over ${formatPlural(present.length, 'trial')} that are in${missing > 0 ? `; missing in ${formatPlural(missing, 'trial')}` : ''}.`,
        )}
        columns={
          isLevels
            ? [{ name: 'level' }, { name: 'trials' }]
            : [{ name: 'from' }, { name: 'to' }, { name: 'trials' }]
        }
        rows={bars.map((bar) => (isLevels ? [bar.from, bar.count] : [bar.from, bar.to, bar.count]))}
        fileName={`${fileName}-label`}
      >
        <LabelHistogram values={present} label={label} />
      </Figure>
      <Figure
        title="Label and rate against trial order"
        caption={numbers(
          `Nothing is fitted here. Lag-1 autocorrelation of the label ${lag === null ? '–' : chartNumber(lag, 2, true)}, of the rate ${rateLag === null ? '–' : chartNumber(rateLag, 2, true)}. Lines: running means over 25 trials; dots: each trial’s rate, mean over units.`,
        )}
        columns={[
          { name: 'trial' },
          { name: label },
          { name: 'rate', unit: 'spikes/s', decimals: 2 },
          { name: 'excluded' },
        ]}
        rows={orderRows}
        fileName={`${fileName}-order`}
      >
        <OrderPlot label={included} labelName={label} rateHz={rateHz} />
      </Figure>
    </div>
  );
}
