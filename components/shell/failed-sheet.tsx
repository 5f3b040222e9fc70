'use client';

import { FailureWords } from '@/components/shell/failure-words';
import { MessageSheet } from '@/components/shell/message-sheet';
import { Button } from '@/components/ui/button';

/** A page that could not be made, where not even the layout is sure to be there. */
export function FailedSheet({ digest }: { digest: string | undefined }) {
  const isAway = digest === 'unavailable';
  return (
    <MessageSheet
      title={isAway ? 'A part of the service is away' : 'This page could not be made'}
      side={isAway ? '503' : '500'}
      acts={<Button onClick={() => window.location.reload()}>Try again</Button>}
    >
      <FailureWords digest={digest} />
    </MessageSheet>
  );
}
