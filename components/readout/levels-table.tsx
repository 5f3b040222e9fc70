import type { ReadoutResult } from '@/lib/contracts/readout';
import { chartNumber } from '@/components/charts/chart-number';
import { formatCount } from '@/lib/format/format-count';
import { formatInterval } from '@/lib/format/format-interval';
import { formatNumber } from '@/lib/format/format-number';
import { formatValue } from '@/lib/format/format-value';

/** Held-out predictions at each level of the label. */
export function LevelsTable({ result }: { result: ReadoutResult }) {
  const withInterval = result.perLevel.some((row) => row.meanInterval !== null);
  return (
    <div
      className="scroll"
      tabIndex={0}
      role="region"
      aria-label="Table of levels"
      style={{ maxHeight: 420, overflow: 'auto' }}
    >
      <table>
        <caption className="vh">Held-out predictions at each level</caption>
        <thead>
          <tr>
            <th scope="col" className="num">
              Level
            </th>
            <th scope="col" className="num">
              Held out<span className="u">trials</span>
            </th>
            <th scope="col" className="num">
              Mean
            </th>
            {withInterval && (
              <th scope="col" className="num">
                95 % of the mean
              </th>
            )}
            <th scope="col" className="num">
              SD
            </th>
            <th scope="col" className="num">
              Bias
            </th>
          </tr>
        </thead>
        <tbody>
          {result.perLevel.map((row) => (
            <tr key={row.level}>
              <td className="n">{formatValue(row.level)}</td>
              <td className="n">{formatCount(row.nTrials)}</td>
              <td className="n">{formatNumber(row.meanPredicted, 3)}</td>
              {withInterval && <td className="n">{formatInterval(row.meanInterval, 3)}</td>}
              <td className="n">{formatNumber(row.sdPredicted, 3)}</td>
              <td className="n">{row.bias === null ? '–' : chartNumber(row.bias, 3, true)}</td>
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}
