'use client';

import { FailedSheet } from '@/components/shell/failed-sheet';

export default function ErrorPage({ error }: { error: Error & { digest?: string } }) {
  return <FailedSheet digest={error.digest} />;
}
