import { foldColour } from '@/components/fold-strip/fold-colour';
import type { ReadoutResult } from '@/lib/contracts/readout';
import { formatCount } from '@/lib/format/format-count';
import { formatNumber } from '@/lib/format/format-number';
import { formatValue } from '@/lib/format/format-value';

/** What each fold was fitted on, what it chose, and how it did. Folds of repeats follow each other. */
export function FoldsTable({ result }: { result: ReadoutResult }) {
  const { perFold } = result;
  const repeated = perFold.some((fold) => fold.repeat > 0);
  const purged = perFold.some((fold) => fold.nPurged > 0);
  const dropped = perFold.some((fold) => fold.droppedFeatures > 0);
  const penalty = perFold.some((fold) => fold.penalty !== null);
  const components = perFold.some((fold) => fold.components !== null);
  const nFolds = Math.max(...perFold.map((fold) => fold.fold)) + 1;
  const step = 12 / nFolds;
  return (
    <div
      className="scroll"
      tabIndex={0}
      role="region"
      aria-label="Table of folds"
      style={{ maxHeight: 420, overflow: 'auto' }}
    >
      <table>
        <caption className="vh">Folds</caption>
        <thead>
          <tr>
            {repeated && (
              <th scope="col" className="num">
                Repeat
              </th>
            )}
            <th scope="col">Fold</th>
            <th scope="col" className="num">
              Held out<span className="u">trials</span>
            </th>
            <th scope="col" className="num">
              Fitted on<span className="u">trials</span>
            </th>
            {purged && (
              <th scope="col" className="num">
                Purged<span className="u">trials</span>
              </th>
            )}
            {dropped && (
              <th scope="col" className="num">
                Dropped<span className="u">features</span>
              </th>
            )}
            {penalty && (
              <th scope="col" className="num">
                Penalty<span className="u">λ</span>
              </th>
            )}
            {components && (
              <th scope="col" className="num">
                Components
              </th>
            )}
            <th scope="col" className="num">
              RMSE
            </th>
            <th scope="col" className="num">
              R²
            </th>
          </tr>
        </thead>
        <tbody>
          {perFold.map((fold) => (
            <tr key={`${fold.repeat} ${fold.fold}`}>
              {repeated && <td className="n">{fold.repeat + 1}</td>}
              <td style={{ whiteSpace: 'nowrap' }}>
                <svg
                  width="12"
                  height="12"
                  aria-hidden="true"
                  style={{ display: 'inline-block', verticalAlign: -2, marginRight: 8 }}
                >
                  <rect
                    width="12"
                    height={Math.max(1.5, step - 0.4)}
                    y={fold.fold * step}
                    style={{ fill: foldColour(fold.fold) }}
                  />
                </svg>
                <span className="n">{fold.fold + 1}</span>
              </td>
              <td className="n">{formatCount(fold.nTest)}</td>
              <td className="n">{formatCount(fold.nTrain)}</td>
              {purged && <td className="n">{formatCount(fold.nPurged)}</td>}
              {dropped && <td className="n">{formatCount(fold.droppedFeatures)}</td>}
              {penalty && (
                <td className="n">
                  {fold.penalty === null ? '–' : formatValue(fold.penalty, 3)}
                  {fold.atGridEdge && <span className="w-warn"> at the edge</span>}
                </td>
              )}
              {components && <td className="n">{fold.components ?? '–'}</td>}
              <td className="n">{formatNumber(fold.rmse, 3)}</td>
              <td className="n">{formatNumber(fold.r2)}</td>
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}
