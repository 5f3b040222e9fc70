import type { ReactNode } from 'react';
import type { RecipeCheck } from '@/components/recipe/recipe-checks';
import { numbers } from '@/components/ui/numbers';
import { SeverityMark } from '@/components/ui/severity-mark';

const words = { stops: 'stops', warns: 'warns', notes: 'note', fine: 'fine' } as const;

/** One row of a recipe: term, field, because; its checks stand in the margin beside it. */
export function RecipeRow({
  id,
  term,
  because,
  checks,
  children,
}: {
  id: string;
  term: string;
  because?: ReactNode;
  checks: readonly RecipeCheck[];
  children: ReactNode;
}) {
  return (
    <section className="sec tight" id={`row-${id}`} aria-labelledby={`row-${id}-term`}>
      <div className="body">
        <div className="row">
          <h2 className="term" id={`row-${id}-term`}>
            {term}
          </h2>
          <div>{children}</div>
          <div className="because">{numbers(because)}</div>
        </div>
      </div>
      <div className="margin">
        {checks.map((check) => (
          <p key={check.message} className={`check ${check.severity === 'fine' ? 'ok' : ''}`}>
            <SeverityMark severity={check.severity} />
            <span className="vh">{words[check.severity]}: </span>
            {numbers(check.message)}
          </p>
        ))}
      </div>
    </section>
  );
}
