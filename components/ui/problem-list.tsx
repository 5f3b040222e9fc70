import type { ReactNode } from 'react';
import { numbers } from '@/components/ui/numbers';
import { SeverityMark } from '@/components/ui/severity-mark';
import type { Problem, Severity } from '@/lib/contracts/problem';
import { formatPlace } from '@/lib/format/format-place';

const wordClass: Record<Severity, string> = { stops: 'w-not', warns: 'w-warn', notes: 'w-tell' };
const order: Record<Severity, number> = { stops: 0, warns: 1, notes: 2 };

/** Problems of files, an intake or a recipe: severity in words and shape, sentence, place in mono, remedy; the gravest first. */
export function ProblemList({
  problems,
  act,
}: {
  problems: readonly Problem[];
  /** What can be done about one, at its right. */
  act?: (problem: Problem) => ReactNode;
}) {
  const sorted = [...problems].sort((a, b) => order[a.severity] - order[b.severity]);
  return (
    <ol>
      {sorted.map((problem, index) => {
        const place = formatPlace(problem.place);
        return (
          <li className="prob" key={`${problem.code} ${place} ${index}`}>
            <span className="sev">
              <SeverityMark severity={problem.severity} />
              <span className={wordClass[problem.severity]}>{problem.severity}</span>
            </span>
            <span>
              <b>{numbers(problem.message)}</b>
              {place ? (
                <>
                  <br />
                  <code className="quiet">{place}</code>
                </>
              ) : null}
              {problem.remedy ? (
                <>
                  <br />
                  <span className="say">{numbers(problem.remedy)}</span>
                </>
              ) : null}
            </span>
            <span>{act?.(problem)}</span>
          </li>
        );
      })}
    </ol>
  );
}
