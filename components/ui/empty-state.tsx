import type { ReactNode } from 'react';
import { numbers } from '@/components/ui/numbers';

/** Nothing here yet: what there is, the next step as the one button, then a quiet second way. */
export function EmptyState({
  title,
  action,
  second,
  children,
}: {
  title: string;
  action?: ReactNode;
  second?: ReactNode;
  children?: ReactNode;
}) {
  return (
    <div className="run">
      <p>
        <b>{title}</b>
      </p>
      {children ? <p className="say">{numbers(children)}</p> : null}
      {action || second ? (
        <div className="acts">
          {action}
          {second ? <span className="quiet">{second}</span> : null}
        </div>
      ) : null}
    </div>
  );
}
