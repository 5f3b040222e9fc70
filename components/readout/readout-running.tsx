'use client';
import { useRouter } from 'next/navigation';
import { useEffect, useState } from 'react';
import { Button } from '@/components/ui/button';
import { numbers } from '@/components/ui/numbers';
import { Progress } from '@/components/ui/progress';
import { ApiError } from '@/lib/client/api-error';
import { requestJson } from '@/lib/client/request-json';
import { useLiveEvents } from '@/lib/client/use-live-events';
import { readoutSchema, type Progress as ProgressState, type ReadoutState } from '@/lib/contracts/readout';
import { formatDuration } from '@/lib/format/format-duration';

/**
 * A readout that waits or runs: what it is doing, done of all, time so far and left, cancel. It follows the server's
 * events, asks by itself while they are away, and gives way to the result as soon as there is one.
 */
export function ReadoutRunning({
  readoutId,
  sessionId,
  number,
  createdAt,
  initialState,
  initialProgress,
  mayCancel,
}: {
  readoutId: string;
  sessionId: string;
  number: number;
  createdAt: string;
  initialState: ReadoutState;
  initialProgress: ProgressState | null;
  mayCancel: boolean;
}) {
  const router = useRouter();
  const [state, setState] = useState(initialState);
  const [progress, setProgress] = useState(initialProgress);
  const [elapsed, setElapsed] = useState<number | null>(null);
  const [cancelling, setCancelling] = useState(false);
  const [error, setError] = useState<string | null>(null);

  const take = (next: ReadoutState, nextProgress: ProgressState | null): void => {
    setState(next);
    // A queued readout may be told of once more after it began: the bar never runs backwards for that.
    if (nextProgress) setProgress(nextProgress);
    if (next === 'done' || next === 'failed' || next === 'cancelled') router.refresh();
  };
  const ask = async (): Promise<void> => {
    try {
      const readout = await requestJson(`/readouts/${readoutId}`, { schema: readoutSchema });
      take(readout.state, readout.progress);
    } catch {
      // The next poll or event brings it up to date; the readout itself goes on.
    }
  };
  const live = useLiveEvents(sessionId, {
    onEvent: (event) => {
      if (event.kind === 'readout' && event.readoutId === readoutId) take(event.state, event.progress);
    },
    onPoll: () => void ask(),
  });

  useEffect(() => {
    const tick = (): void => setElapsed(Math.max(0, (Date.now() - Date.parse(createdAt)) / 1000));
    tick();
    const timer = setInterval(tick, 1000);
    return () => clearInterval(timer);
  }, [createdAt]);

  const cancel = async (): Promise<void> => {
    setCancelling(true);
    setError(null);
    try {
      await requestJson(`/readouts/${readoutId}/cancel`, { method: 'POST' });
      await ask();
    } catch (cause) {
      setCancelling(false);
      setError(cause instanceof ApiError ? cause.message : 'The readout could not be cancelled. Try again.');
    }
  };

  const waits = state === 'queued';
  const ended = state === 'done' || state === 'failed' || state === 'cancelled';
  const share = progress && progress.total > 0 ? progress.done / progress.total : null;
  const doing = ended
    ? 'Reading the result.'
    : waits
      ? 'Nothing has been computed yet.'
      : progress
        ? `${progress.phase}; ${Math.floor(100 * (share ?? 0))} % of all the work is done.`
        : 'Reading the session’s counts.';
  const time = [
    elapsed === null ? '' : `${formatDuration(Math.max(1, Math.round(elapsed)))} since it was asked for`,
    !waits && progress?.secondsLeft != null ? `about ${formatDuration(progress.secondsLeft)} left` : '',
  ].filter((part) => part !== '');
  return (
    <div className="run">
      <p aria-live="polite">
        <b>{numbers(`Readout ${number} ${waits ? 'waits for a free worker.' : 'is running.'}`)}</b>{' '}
        <span className="say">{numbers(doing)}</span>
      </p>
      <Progress
        label={`Readout ${number}`}
        share={share}
        held={waits}
        words={
          <>
            {numbers(time.join(', '))}
            {time.length > 0 && '. '}You can close the page; it goes on.
            {live === 'polling' &&
              elapsed !== null &&
              elapsed > 8 &&
              ' Live news is away; this page asks every few seconds.'}
          </>
        }
        act={
          mayCancel && !ended ? (
            <Button
              kind="plain"
              small
              why={cancelling ? 'It stops after the step it is in.' : null}
              onClick={() => void cancel()}
            >
              {cancelling ? 'Cancelling' : 'Cancel'}
            </Button>
          ) : null
        }
      />
      {error && (
        <p className="err" role="alert">
          {error}
        </p>
      )}
    </div>
  );
}
