import Link from 'next/link';
import { numbers } from '@/components/ui/numbers';
import { ProblemList } from '@/components/ui/problem-list';
import type { Readout } from '@/lib/contracts/readout';
import { formatInstant } from '@/lib/format/format-instant';

/** A readout without a result: failed or cancelled, why, and the next step. It stays in the ledger. */
export function ReadoutEnded({ readout, mayRepeat }: { readout: Readout; mayRepeat: boolean }) {
  const { progress } = readout;
  const failed = readout.state === 'failed';
  const at =
    progress && progress.total > 0
      ? ` after ${Math.floor((100 * progress.done) / progress.total)} % of its work (${progress.phase})`
      : '';
  return (
    <div>
      <div className="run">
        <p>
          <b className={failed ? 'w-not' : undefined}>
            {numbers(`Readout ${readout.number} ${failed ? 'failed' : 'was cancelled'}`)}
          </b>
          <span className="say">
            {numbers(
              `${at}${readout.finishedAt ? `, ${formatInstant(readout.finishedAt)}` : ''}. It has no result and stays in the ledger.`,
            )}
          </span>
        </p>
        {mayRepeat && (
          <div className="acts">
            <Link className="btn" href={`/sessions/${readout.sessionId}/readouts/new?from=${readout.id}`}>
              {failed ? 'Repeat with one change' : 'Ask for it again'}
            </Link>
          </div>
        )}
      </div>
      {readout.problems.length > 0 && (
        <div style={{ marginTop: 24 }}>
          <h3>What stopped it</h3>
          <ProblemList problems={readout.problems} />
        </div>
      )}
    </div>
  );
}
