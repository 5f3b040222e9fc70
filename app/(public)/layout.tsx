import type { ReactNode } from 'react';

export default function PublicLayout({ children }: { children: ReactNode }) {
  return (
    <>
      <a className="skip" href="#sheet">
        Skip to the sheet
      </a>
      {children}
    </>
  );
}
