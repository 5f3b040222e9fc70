'use client';
import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { LeaveOutForm } from '@/components/fold-strip/leave-out-form';
import { spellRanges } from '@/components/session/spell-ranges';
import { Button } from '@/components/ui/button';
import { numbers } from '@/components/ui/numbers';
import type { ExclusionList } from '@/lib/contracts/session';
import { formatCount } from '@/lib/format/format-count';
import { formatInstant } from '@/lib/format/format-instant';
import { formatPlural } from '@/lib/format/format-plural';

/**
 * Every entry of the exclusion list in the order it was made, with what is left after it; entries are never removed,
 * putting back is another entry.
 */
export function ExclusionEntries({
  sessionId,
  list,
  nTrials,
  nUnits,
  mayExclude,
}: {
  sessionId: string;
  list: ExclusionList;
  nTrials: number;
  nUnits: number;
  mayExclude: boolean;
}) {
  const router = useRouter();
  const [returning, setReturning] = useState<number | null>(null);
  const outNow = { trial: new Set(list.excludedTrials), unit: new Set(list.excludedUnits) };
  const left = { trial: new Set<number>(), unit: new Set<number>() };
  const entries = [...list.items]
    .sort((a, b) => a.version - b.version)
    .map((item) => {
      for (const index of item.indices) {
        if (item.action === 'leaveOut') left[item.kind].add(index);
        else left[item.kind].delete(index);
      }
      return {
        item,
        remaining: item.kind === 'trial' ? nTrials - left.trial.size : nUnits - left.unit.size,
        stillOut:
          item.action === 'leaveOut' ? item.indices.filter((index) => outNow[item.kind].has(index)) : [],
      };
    });
  return (
    <ol className="flow2">
      <li>
        <span className="n">{formatCount(nTrials)}</span> <b>trials recorded</b>{' '}
        <span className="say">{numbers(`with ${formatPlural(nUnits, 'unit')}`)}</span>
      </li>
      {entries.map(({ item, remaining, stillOut }) => (
        <li key={item.version}>
          <span className="n">{formatCount(remaining)}</span>{' '}
          <b>
            {numbers(
              `${formatPlural(item.indices.length, item.kind)} ${item.action === 'leaveOut' ? 'left out' : 'put back'}`,
            )}
          </b>{' '}
          <span className="say">
            {item.reason}
            <br />
            {numbers(
              `${item.kind}${item.indices.length === 1 ? '' : 's'} ${spellRanges(item.indices)}, ${item.authorName}, ${formatInstant(item.createdAt)}`,
            )}
            {mayExclude && stillOut.length > 0 && returning !== item.version && (
              <>
                {'. '}
                <Button kind="link" onClick={() => setReturning(item.version)}>
                  {numbers(`Put back ${formatPlural(stillOut.length, item.kind)}`)}
                </Button>
              </>
            )}
            {returning === item.version && (
              <LeaveOutForm
                sessionId={sessionId}
                kind={item.kind === 'trial' ? 'trials' : 'units'}
                action="putBack"
                indices={stillOut}
                onCancel={() => setReturning(null)}
                onDone={() => {
                  setReturning(null);
                  router.refresh();
                }}
              />
            )}
          </span>
        </li>
      ))}
    </ol>
  );
}
