'use client';

import './globals.css';
import { FailedSheet } from '@/components/shell/failed-sheet';

/** Stands in where even the root layout could not be made; it has to bring its own html and body. */
export default function GlobalError({ error }: { error: Error & { digest?: string } }) {
  return (
    <html lang="en">
      <body>
        <title>Something went wrong · Outfold</title>
        <FailedSheet digest={error.digest} />
      </body>
    </html>
  );
}
