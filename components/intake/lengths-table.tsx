import type { MatchedLengths } from '@/lib/client/intake/match-lengths';
import type { CountsAxis } from '@/lib/contracts/intake';
import { formatCount } from '@/lib/format/format-count';

const axes: CountsAxis[] = ['trial', 'unit', 'bin'];

/** The lengths of the used arrays along each axis, and whether they agree. */
export function LengthsTable({ matched }: { matched: MatchedLengths }) {
  return (
    <div className="scroll" tabIndex={0} role="region" aria-label="Lengths matched, table">
      <table className="agree lengths">
        <caption className="vh">Lengths along each axis</caption>
        <thead>
          <tr>
            <th scope="col" className="lengths-name">
              Array
            </th>
            {axes.map((axis) => (
              <th key={axis} scope="col" className="num">
                {axis}
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {matched.rows.map((row) => (
            <tr key={row.name} className="flush">
              <td className="lengths-name">{row.name}</td>
              {axes.map((axis) => {
                const length = row.lengths[axis];
                const { verdict } = matched.axes[axis];
                const shade = verdict === 'agree' ? ' hit' : verdict === 'differ' ? ' miss' : '';
                return (
                  <td key={axis} className={length === undefined ? undefined : `n${shade}`}>
                    {length === undefined ? null : formatCount(length)}
                  </td>
                );
              })}
            </tr>
          ))}
        </tbody>
        <tfoot>
          <tr>
            <td className="lengths-name lengths-foot">
              <b>agree</b>
            </td>
            {axes.map((axis) => {
              const { verdict, lengths } = matched.axes[axis];
              return (
                <td key={axis} className="lengths-foot">
                  {verdict === 'agree' ? <span className="w-holds">yes</span> : null}
                  {verdict === 'differ' ? (
                    <span className="w-not">
                      no: <span className="n">{lengths.map(formatCount).join(', ')}</span>
                    </span>
                  ) : null}
                  {verdict === 'one only' ? <span className="quiet">one only</span> : null}
                </td>
              );
            })}
          </tr>
        </tfoot>
      </table>
    </div>
  );
}
