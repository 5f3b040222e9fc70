import type { ReactNode } from 'react';

/** A number, identifier or time in the mono face with tabular figures; it never breaks. */
export function Num({ children, className }: { children: ReactNode; className?: string }) {
  return <span className={className ? `n ${className}` : 'n'}>{children}</span>;
}
