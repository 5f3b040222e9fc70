import type { ReactNode } from 'react';
import { RunningHead, type TrailStep } from '@/components/shell/running-head';
import { StandingCautions } from '@/components/shell/standing-cautions';

/**
 * A signed-in page: running head, sections, standing cautions. `trail` starts after the lab, which is added by itself:
 *   <Sheet trail={[{ label: study.name, href: `/studies/${study.id}` }, { label: session.name }]}> <Section …/> … </Sheet>
 * `foot` is a bar that sticks to the window's lower edge (class runbar).
 */
export function Sheet({
  trail,
  foot,
  children,
}: {
  trail: readonly TrailStep[];
  foot?: ReactNode;
  children: ReactNode;
}) {
  return (
    <>
      <a className="skip" href="#sheet">
        Skip to the sheet
      </a>
      <RunningHead trail={trail} />
      <main id="sheet" tabIndex={-1}>
        {children}
        {foot}
      </main>
      <StandingCautions />
    </>
  );
}
