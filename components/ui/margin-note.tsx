import type { ReactNode } from 'react';
import { numbers } from '@/components/ui/numbers';

const kinds = { plain: '', warn: ' warn', stop: ' stop', open: ' open' } as const;

/** A note in the margin: its anchor in mono, who and when, and the words. */
export function MarginNote({
  on,
  href,
  who,
  kind = 'plain',
  children,
}: {
  on?: string;
  href?: string;
  who?: string;
  kind?: keyof typeof kinds;
  children: ReactNode;
}) {
  return (
    <div className={`note${kinds[kind]}`}>
      {on && href ? (
        <a className="on" href={href}>
          {on}
        </a>
      ) : null}
      {on && !href ? <span className="on">{on}</span> : null}
      {who ? <span className="who">{who}</span> : null}
      {numbers(children)}
    </div>
  );
}
