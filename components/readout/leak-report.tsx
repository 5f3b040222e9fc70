import { leakRows } from '@/components/readout/leak-rows';
import { numbers } from '@/components/ui/numbers';
import type { ReadoutResult } from '@/lib/contracts/readout';
import type { Recipe } from '@/lib/contracts/recipe';

/** Every fitted step and the rows it saw. */
export function LeakReport({ recipe, result }: { recipe: Recipe; result: ReadoutResult }) {
  return (
    <div className="scroll" tabIndex={0} role="region" aria-label="Table of fitted steps">
      <table style={{ minWidth: 560 }}>
        <caption className="vh">Leak report</caption>
        <thead>
          <tr>
            <th scope="col">Fitted step</th>
            <th scope="col">Rows it saw</th>
            <th scope="col">Note</th>
          </tr>
        </thead>
        <tbody>
          {leakRows(recipe, result).map((row) => (
            <tr key={row.step}>
              <td>{numbers(row.step)}</td>
              <td>{numbers(row.rows)}</td>
              <td className="quiet">{numbers(row.note)}</td>
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}
