import type { ReactNode } from 'react';
import { numbers } from '@/components/ui/numbers';

/**
 * One section of a sheet: the margin with its side head, one line of why and notes; the rule; the body.
 * `title` is the side head (h2). The first section of a sheet usually has none and puts its h1 into the body.
 */
export function Section({
  title,
  why,
  side,
  id,
  tight = false,
  children,
}: {
  title?: string;
  why?: ReactNode;
  /** Notes, links, key facts: whatever stands in the margin under the side head. */
  side?: ReactNode;
  id?: string;
  /** Less height, for rows of a form. */
  tight?: boolean;
  children: ReactNode;
}) {
  const headId = title && id ? `${id}-head` : undefined;
  return (
    <section className={tight ? 'sec tight' : 'sec'} id={id} aria-labelledby={headId}>
      <div className="margin">
        {title ? <h2 id={headId}>{title}</h2> : null}
        {why ? <p className="why">{numbers(why)}</p> : null}
        {side}
      </div>
      <div className="body">{children}</div>
    </section>
  );
}
