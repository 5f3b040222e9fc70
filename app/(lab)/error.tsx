'use client';

import { FailureWords } from '@/components/shell/failure-words';
import { Sheet } from '@/components/shell/sheet';
import { Button } from '@/components/ui/button';
import { Section } from '@/components/ui/section';

/** A page that could not be made, with the running head still there. */
export default function LabErrorPage({ error }: { error: Error & { digest?: string } }) {
  const isAway = error.digest === 'unavailable';
  return (
    <Sheet trail={[{ label: 'Not readable now' }]}>
      <Section>
        <h1 className="name">{isAway ? 'A part of the service is away' : 'This page could not be made'}</h1>
        <div className="lead spaced">
          <FailureWords digest={error.digest} />
        </div>
        <div className="acts">
          <Button onClick={() => window.location.reload()}>Try again</Button>
        </div>
      </Section>
    </Sheet>
  );
}
