import Link from 'next/link';
import type { ReactNode } from 'react';

const kinds = { filled: 'btn', plain: 'btn plain' } as const;

/** A link that looks like a button: for the one next step of a view when that step is another page. */
export function ButtonLink({
  href,
  kind = 'filled',
  small = false,
  children,
}: {
  href: string;
  kind?: keyof typeof kinds;
  small?: boolean;
  children: ReactNode;
}) {
  return (
    <Link className={small ? `${kinds[kind]} small` : kinds[kind]} href={href}>
      {children}
    </Link>
  );
}
