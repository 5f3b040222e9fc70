'use client';
import { useRouter } from 'next/navigation';
import { EmptyState } from '@/components/ui/empty-state';
import { ButtonLink } from '@/components/ui/button-link';
import { useLiveEvents } from '@/lib/client/use-live-events';
import type { Session } from '@/lib/contracts/session';

const words: Record<Session['state'], { title: string; text: string; act: string }> = {
  empty: {
    title: 'No data yet',
    text: 'This session has a date and an animal, but no files.',
    act: 'Bring the files in',
  },
  checking: {
    title: 'The data are being checked',
    text: 'This page shows them as soon as the checks are through.',
    act: 'See the intake',
  },
  waiting: {
    title: 'The checks left warnings',
    text: 'Somebody must accept them, or change the mapping, before the session can be used.',
    act: 'See the warnings',
  },
  refused: {
    title: 'The data were refused',
    text: 'The intake says what is wrong and where.',
    act: 'See what is wrong',
  },
  ready: { title: 'Ready', text: '', act: 'See the intake' },
};

/** A session without usable data: what there is, and the next step. It turns into the sheet by itself. */
export function SessionWaiting({
  sessionId,
  state,
  mayUpload,
}: {
  sessionId: string;
  state: Session['state'];
  mayUpload: boolean;
}) {
  const router = useRouter();
  useLiveEvents(sessionId, {
    onEvent: (event) => {
      if (event.kind === 'session' && event.state !== state) router.refresh();
    },
    onPoll: () => {
      if (state === 'checking') router.refresh();
    },
  });
  const { title, text, act } = words[state];
  return (
    <EmptyState
      title={title}
      action={
        mayUpload || state !== 'empty' ? (
          <ButtonLink href={`/sessions/${sessionId}/intake`}>{act}</ButtonLink>
        ) : null
      }
      second={
        state === 'empty' ? (mayUpload ? 'NPZ, NPY, CSV or TSV' : 'Your role may look, not upload.') : null
      }
    >
      {text}
    </EmptyState>
  );
}
