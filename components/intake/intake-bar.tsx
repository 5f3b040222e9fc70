import type { ReactNode } from 'react';
import { countSeverities } from '@/components/intake/count-severities';
import { SeverityMark } from '@/components/ui/severity-mark';
import type { Problem } from '@/lib/contracts/problem';

/** The bar at the foot: how many problems stop and warn, what is still to be settled, and the one action. */
export function IntakeBar({
  problems,
  children,
  acts,
}: {
  problems: readonly Problem[];
  children: ReactNode;
  acts: ReactNode;
}) {
  const { stops, warns, notes } = countSeverities(problems);
  return (
    <div className="runbar" role="region" aria-label="Confirm the data">
      <div className="in">
        <p className="runbar-counts">
          {stops > 0 ? (
            <span>
              <SeverityMark severity="stops" /> <a href="#problems">{stops} stop</a>
            </span>
          ) : null}
          {warns > 0 ? (
            <span>
              <SeverityMark severity="warns" /> <a href="#problems">{warns} warn</a>
            </span>
          ) : null}
          {notes > 0 ? <span>{notes} note</span> : null}
          {problems.length === 0 ? <span className="quiet">no problem known</span> : null}
        </p>
        <div className="r">
          <div className="runbar-words" role="status">
            {children}
          </div>
          <div className="acts">{acts}</div>
        </div>
      </div>
    </div>
  );
}
