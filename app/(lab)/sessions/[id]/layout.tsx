import type { ReactNode } from 'react';
import { readSession } from '@/app/(lab)/sessions/[id]/read-session';

/** Looks for the session before anything is streamed, so that one that is not there answers 404 and not 200. */
export default async function SessionLayout({
  children,
  params,
}: {
  children: ReactNode;
  params: Promise<{ id: string }>;
}) {
  await readSession((await params).id);
  return children;
}
