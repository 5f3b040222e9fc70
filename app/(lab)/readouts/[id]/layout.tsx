import type { ReactNode } from 'react';
import { readReadout } from '@/app/(lab)/readouts/[id]/read-readout';

/** Looks for the readout before anything is streamed, so that one that is not there answers 404 and not 200. */
export default async function ReadoutLayout({
  children,
  params,
}: {
  children: ReactNode;
  params: Promise<{ id: string }>;
}) {
  await readReadout((await params).id);
  return children;
}
