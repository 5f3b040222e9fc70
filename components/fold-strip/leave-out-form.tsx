'use client';
import { useId, useState, type FormEvent } from 'react';
import styles from '@/components/fold-strip/fold-strip.module.css';
import { Button } from '@/components/ui/button';
import { ApiError } from '@/lib/client/api-error';
import { requestJson } from '@/lib/client/request-json';
import { formatPlural } from '@/lib/format/format-plural';

/** Asks for the reason of leaving trials or units out (or of putting them back) and writes the entry. */
export function LeaveOutForm({
  sessionId,
  kind,
  action,
  indices,
  takesFocus = true,
  onDone,
  onCancel,
}: {
  sessionId: string;
  kind: 'trials' | 'units';
  action: 'leaveOut' | 'putBack';
  indices: readonly number[];
  /** Whether typing begins here at once; not while more may still be ticked. */
  takesFocus?: boolean;
  onDone: (reason: string) => void;
  onCancel: () => void;
}) {
  const [reason, setReason] = useState('');
  const [error, setError] = useState<string | null>(null);
  const [busy, setBusy] = useState(false);
  const id = useId();
  const counted = formatPlural(indices.length, kind === 'trials' ? 'trial' : 'unit');
  const words = action === 'leaveOut' ? `Leave out ${counted}` : `Put back ${counted}`;
  const submit = async (event: FormEvent): Promise<void> => {
    event.preventDefault();
    if (reason.trim() === '') {
      setError('Write the reason: it stays with the exclusion in the record.');
      return;
    }
    setBusy(true);
    setError(null);
    try {
      await requestJson(`/sessions/${sessionId}/exclusions`, {
        method: 'POST',
        body: { action, [kind]: indices, reason: reason.trim() },
      });
      onDone(reason.trim());
    } catch (cause) {
      setError(cause instanceof ApiError ? cause.message : 'The exclusion could not be written. Try again.');
      setBusy(false);
    }
  };
  return (
    <form className={styles.form} onSubmit={(event) => void submit(event)}>
      <label htmlFor={id}>
        Reason {action === 'leaveOut' ? 'for leaving out' : 'for putting back'} {counted}
        <input
          id={id}
          type="text"
          value={reason}
          maxLength={2000}
          // Opened by the member's own act; the next thing to do is to type.
          autoFocus={takesFocus}
          className={error ? 'field-err' : undefined}
          aria-invalid={error ? true : undefined}
          aria-describedby={error ? `${id}-err` : undefined}
          onChange={(event) => setReason(event.target.value)}
          onKeyDown={(event) => event.key === 'Escape' && onCancel()}
        />
      </label>
      <span className="acts">
        <Button
          type="submit"
          kind={action === 'leaveOut' ? 'danger' : 'plain'}
          why={busy ? 'being written' : null}
          showWhy={false}
        >
          {words}
        </Button>
        <Button kind="link" onClick={onCancel}>
          Let go
        </Button>
      </span>
      {error && (
        <p className="err" id={`${id}-err`} role="alert">
          {error}
        </p>
      )}
    </form>
  );
}
