'use client';

import { createContext, useContext, type ReactNode } from 'react';
import type { Role } from '@/lib/contracts/lab';

/** Who looks at the page, and in which lab. */
export interface Viewer {
  userName: string;
  role: Role;
  labName: string;
}

const ViewerContext = createContext<Viewer | null>(null);

export function ViewerProvider({ viewer, children }: { viewer: Viewer; children: ReactNode }) {
  return <ViewerContext value={viewer}>{children}</ViewerContext>;
}

/** The signed-in member; null on public pages. */
export function useViewer(): Viewer | null {
  return useContext(ViewerContext);
}
