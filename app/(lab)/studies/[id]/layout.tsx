import type { ReactNode } from 'react';
import { readStudy } from '@/app/(lab)/studies/[id]/read-study';

/** Looks for the study before anything is streamed, so that one that is not there answers 404 and not 200. */
export default async function StudyLayout({
  children,
  params,
}: {
  children: ReactNode;
  params: Promise<{ id: string }>;
}) {
  await readStudy((await params).id);
  return children;
}
