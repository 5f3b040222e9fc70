import type { ReadoutLine } from '@/db/repositories/readout-lists';
import { formatDuration } from '@/lib/format/format-duration';

/** How it stands with a readout, in a few words. */
export function statusLine(
  line: Pick<ReadoutLine, 'state' | 'progress' | 'problems' | 'startedAt' | 'finishedAt'>,
): string {
  const { state, progress, problems, startedAt, finishedAt } = line;
  const percent = progress && progress.total > 0 ? Math.floor((100 * progress.done) / progress.total) : 0;
  switch (state) {
    case 'queued':
      return 'waits for a worker';
    case 'running':
      return progress ? `${progress.phase}, ${percent} %` : 'running';
    case 'done':
      return startedAt && finishedAt
        ? `done in ${formatDuration((finishedAt.getTime() - startedAt.getTime()) / 1_000)}`
        : 'done';
    case 'failed':
      return `failed: ${problems[0]?.message ?? 'no reason is known'}`;
    case 'cancelled':
      return progress ? `cancelled at ${percent} %` : 'cancelled';
  }
}
