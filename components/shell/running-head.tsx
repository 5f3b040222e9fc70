'use client';

import Link from 'next/link';
import { useState } from 'react';
import { Mark } from '@/components/shell/mark';
import { SignOutButton } from '@/components/shell/sign-out-button';
import { ThemeToggle } from '@/components/shell/theme-toggle';
import { useViewer } from '@/components/shell/viewer';
import { numbers } from '@/components/ui/numbers';

/** One step of the way to this page; the last one has no address. */
export interface TrailStep {
  label: string;
  href?: string;
}

/** Where you are, as in a book: the mark, lab / study / session / page, and the few words on the right. */
export function RunningHead({ trail }: { trail: readonly TrailStep[] }) {
  const viewer = useViewer();
  const [isMenuOpen, setIsMenuOpen] = useState(false);
  const lab: TrailStep[] = viewer
    ? [{ label: viewer.labName, href: trail.length > 0 ? '/' : undefined }]
    : [];
  const steps = [...lab, ...trail];
  return (
    <>
      <header className="head">
        <Link className="mark" href="/">
          <Mark />
          Outfold
        </Link>
        <div className="bar">
          <nav className="trail-nav" aria-label="Where you are">
            <ol className="trail">
              {steps.map((step, index) => (
                <li key={`${index} ${step.label}`}>
                  {step.href && index < steps.length - 1 ? (
                    <Link href={step.href}>{step.label}</Link>
                  ) : (
                    <span aria-current="page">{numbers(step.label)}</span>
                  )}
                </li>
              ))}
            </ol>
          </nav>
          <div className="tools">
            <ThemeToggle />
            {viewer ? (
              <>
                <Link href="/account">
                  {viewer.userName}, {viewer.role}
                </Link>
                <SignOutButton />
                <button
                  type="button"
                  className="menu"
                  aria-expanded={isMenuOpen}
                  aria-controls="menu-panel"
                  onClick={() => setIsMenuOpen(!isMenuOpen)}
                >
                  {isMenuOpen ? 'Close' : 'Menu'}
                </button>
              </>
            ) : null}
          </div>
        </div>
      </header>
      {viewer ? (
        <nav className="menu-panel" id="menu-panel" aria-label="Menu" hidden={!isMenuOpen}>
          <ul>
            {steps.slice(0, -1).map((step, index) => (
              <li key={`${index} ${step.label}`}>
                <Link href={step.href ?? '/'}>{step.label}</Link>
              </li>
            ))}
            <li>
              <ThemeToggle />
            </li>
            <li>
              <Link href="/account">
                {viewer.userName}, {viewer.role}
              </Link>
            </li>
            <li>
              <SignOutButton />
            </li>
          </ul>
        </nav>
      ) : null}
    </>
  );
}
