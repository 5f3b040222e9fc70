import { IntervalAxis } from '@/components/charts/interval-axis';
import { IntervalGlyph } from '@/components/charts/interval-glyph';
import { sharedAxis } from '@/components/charts/shared-axis';
import { markOfVerdict } from '@/components/readout/mark-of-verdict';
import { nestedIntervalWords } from '@/components/readout/nested-interval-words';
import { testTrialIntervalWords } from '@/components/readout/test-trial-interval-words';
import { numbers } from '@/components/ui/numbers';
import type { ReadoutResult } from '@/lib/contracts/readout';
import { formatInterval } from '@/lib/format/format-interval';

/** Both intervals of the held-out R², by name, with what each covers, on one axis. */
export function TwoIntervals({ result }: { result: ReadoutResult }) {
  const { heldOut, verdict } = result;
  const rows = [
    heldOut.r2Interval && { interval: heldOut.r2Interval, ...nestedIntervalWords(heldOut.r2Interval) },
    heldOut.testTrialInterval && {
      interval: heldOut.testTrialInterval,
      ...testTrialIntervalWords(heldOut.testTrialInterval),
    },
  ].filter((row) => row !== null);
  if (rows.length === 0) return null;
  const axis = sharedAxis(rows.map((row) => ({ value: heldOut.r2, interval: row.interval })));
  return (
    <div className="scroll" tabIndex={0} role="region" aria-label="Table of the two intervals">
      <table className="stack ctls" role="table">
        <caption className="vh">Two intervals of the held-out R²</caption>
        <thead role="rowgroup">
          <tr role="row">
            <th scope="col" role="columnheader">
              Interval
            </th>
            <th scope="col" role="columnheader" style={{ width: 264 }}>
              <IntervalAxis axis={axis} width={250} />
            </th>
            <th scope="col" role="columnheader" className="num">
              R²<span className="u">95 %</span>
            </th>
            <th scope="col" role="columnheader">
              What it covers
            </th>
          </tr>
        </thead>
        <tbody role="rowgroup">
          {rows.map((row) => (
            <tr key={row.name} role="row">
              <td role="cell">{row.name}</td>
              <td role="cell" className="iv">
                <IntervalGlyph
                  value={heldOut.r2}
                  interval={row.interval}
                  mark={markOfVerdict(verdict.kind)}
                  axis={axis}
                  width={250}
                />
              </td>
              <td role="cell" className="n">
                {formatInterval(row.interval)}
              </td>
              <td role="cell" className="say" style={{ paddingBlock: 6, lineHeight: 1.35 }}>
                {numbers(row.covers)}
              </td>
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}
