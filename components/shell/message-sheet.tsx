import Link from 'next/link';
import type { ReactNode } from 'react';
import { Mark } from '@/components/shell/mark';
import { ThemeToggle } from '@/components/shell/theme-toggle';

/** A page that only says something: nothing here, something failed, the service is away. It needs no sign-in and no data. */
export function MessageSheet({
  title,
  side,
  acts,
  children,
}: {
  title: string;
  /** A short mono word in the margin, as the status. */
  side?: string;
  acts?: ReactNode;
  children: ReactNode;
}) {
  return (
    <>
      <header className="head">
        <Link className="mark" href="/">
          <Mark />
          Outfold
        </Link>
        <div className="bar">
          <span className="trail-nav" />
          <div className="tools message-tools">
            <ThemeToggle />
          </div>
        </div>
      </header>
      <main id="sheet">
        <section className="sec message-sheet">
          <div className="margin">{side ? <p className="n">{side}</p> : null}</div>
          <div className="body">
            <h1 className="name">{title}</h1>
            <div className="lead spaced">{children}</div>
            {acts ? <div className="acts">{acts}</div> : null}
          </div>
        </section>
      </main>
    </>
  );
}
