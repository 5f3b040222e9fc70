import { db } from '@/db/connection';
import { beatReadout } from '@/db/repositories/readout-claims';
import type { ReadoutRow } from '@/db/repositories/readouts';
import type { Progress } from '@/lib/contracts/readout';
import { publishLive } from '@/lib/jobs/publish-live';
import { log } from '@/lib/log/log';

/** A readout's row held by this worker, for as long as the heartbeat goes on. */
export interface Claim {
  token: string;
  /** Aborts with the reason 'cancelled', 'stopping' or 'lost'. */
  abort: AbortController;
  /** Progress, written with the next heartbeat and told to open pages. */
  report(progress: Progress): void;
  letGo(): void;
}

/**
 * Renews a claim and writes its progress every `everyMs`; looks for a wish to cancel at the same time, so that a cancel
 * works without Redis. While the database is away it keeps trying: a claim that was given away meanwhile shows then.
 */
export function holdClaim({
  row,
  token,
  everyMs,
  stopping,
}: {
  row: ReadoutRow;
  token: string;
  everyMs: number;
  stopping: AbortSignal;
}): Claim {
  const abort = new AbortController();
  let latest: Progress | null = null;
  let isNew = false;
  let isBeating = false;

  const tell = (progress: Progress | null) => {
    const { labId, sessionId, id: readoutId } = row;
    void publishLive({ labId, kind: 'readout', sessionId, readoutId, state: 'running', progress });
  };
  const beat = async () => {
    if (isBeating || abort.signal.aborted) return;
    isBeating = true;
    const progress = isNew ? latest : null;
    isNew = false;
    try {
      const { held, cancel } = await beatReadout(db(), row.id, token, progress);
      if (!held) abort.abort('lost');
      else if (cancel) abort.abort('cancelled');
      else if (progress) tell(progress);
    } catch (error) {
      isNew ||= progress !== null;
      log.debug({ err: error, readoutId: row.id }, 'a heartbeat failed');
    } finally {
      isBeating = false;
    }
  };
  const onStopping = () => abort.abort('stopping');
  stopping.addEventListener('abort', onStopping, { once: true });
  const timer = setInterval(() => void beat(), everyMs);
  tell(null);
  return {
    token,
    abort,
    report(progress) {
      latest = progress;
      isNew = true;
    },
    letGo() {
      clearInterval(timer);
      stopping.removeEventListener('abort', onStopping);
    },
  };
}
