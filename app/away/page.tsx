import type { Metadata } from 'next';
import { FailedSheet } from '@/components/shell/failed-sheet';

export const metadata: Metadata = { title: 'Away' };

/** Stands in for every page while the database is away; proxy.ts fetches it and answers with status 503. */
export default function AwayPage() {
  return <FailedSheet digest="unavailable" />;
}
