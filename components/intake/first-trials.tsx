import { CountsRaster } from '@/components/intake/counts-raster';
import { numbers } from '@/components/ui/numbers';
import { formatCount } from '@/lib/format/format-count';
import { formatValue } from '@/lib/format/format-value';
import type { IntakePreview } from '@/lib/contracts/intake-answer';

const mostColumns = 6;

/** The counts of the first trial as a raster, and the first trials' rows with their total of spikes. */
export function FirstTrials({
  preview,
  labels,
  binWidthMs,
  windowStartMs,
}: {
  preview: IntakePreview;
  /** Names of the label columns, which come first. */
  labels: readonly string[];
  binWidthMs: number;
  windowStartMs: number;
}) {
  const isLabel = (name: string) => labels.includes(name);
  const columns = [...preview.columns].sort((a, b) => Number(isLabel(b.name)) - Number(isLabel(a.name)));
  const shown = columns.slice(0, mostColumns);
  const firstTrial = preview.firstTrial ?? [];
  const hidden = columns.slice(mostColumns).map((column) => column.name);
  return (
    <div className="figs first-trials">
      {firstTrial.length > 0 ? (
        <figure>
          <CountsRaster counts={firstTrial} binWidthMs={binWidthMs} windowStartMs={windowStartMs} />
          <figcaption className="cap">
            {numbers(
              `Trial 1, ${firstTrial.length === 1 ? 'unit 1' : `units 1 to ${firstTrial.length}`} of ${formatCount(preview.nUnits)}: spikes per ${formatValue(binWidthMs)} ms bin, darker is more.${windowStartMs < 0 ? ' The response should follow the line.' : ''}`,
            )}
          </figcaption>
        </figure>
      ) : null}
      <div className="scroll" tabIndex={0} role="region" aria-label="First trials, table">
        <table>
          <caption className="vh">First trials</caption>
          <thead>
            <tr>
              <th scope="col" className="num">
                Trial
              </th>
              {shown.map((column) => (
                <th key={column.name} scope="col" className={column.type === 'category' ? undefined : 'num'}>
                  {column.name}
                  {isLabel(column.name) ? <span className="u">label</span> : null}
                </th>
              ))}
              <th scope="col" className="num">
                Spikes<span className="u">all units</span>
              </th>
            </tr>
          </thead>
          <tbody>
            {preview.totals.map((total, trial) => (
              <tr key={trial} className="flush">
                <td className="n">{trial + 1}</td>
                {shown.map((column) => {
                  const value = column.values[trial];
                  return (
                    <td key={column.name} className={column.type === 'category' ? undefined : 'n'}>
                      {typeof value === 'number' ? formatValue(value) : (value ?? '')}
                    </td>
                  );
                })}
                <td className="n">{formatCount(total)}</td>
              </tr>
            ))}
          </tbody>
        </table>
        {hidden.length > 0 ? <p className="cap">Not shown: {hidden.join(', ')}.</p> : null}
      </div>
    </div>
  );
}
