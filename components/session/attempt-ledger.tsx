'use client';
import Link from 'next/link';
import { useRouter } from 'next/navigation';
import { useMemo, useState } from 'react';
import { IntervalAxis } from '@/components/charts/interval-axis';
import { IntervalGlyph } from '@/components/charts/interval-glyph';
import { sharedAxis } from '@/components/charts/shared-axis';
import { markOfVerdict } from '@/components/readout/mark-of-verdict';
import { SaveCsv } from '@/components/session/save-csv';
import { numbers } from '@/components/ui/numbers';
import { PickSelect } from '@/components/ui/pick-select';
import { useLiveEvents } from '@/lib/client/use-live-events';
import type { ReadoutSummary } from '@/lib/contracts/readout';
import { formatInstant } from '@/lib/format/format-instant';
import { formatNumber } from '@/lib/format/format-number';
import { formatP } from '@/lib/format/format-p';

const shown = {
  all: () => true,
  done: (line: ReadoutSummary) => line.state === 'done',
  running: (line: ReadoutSummary) => line.state === 'running' || line.state === 'queued',
  ended: (line: ReadoutSummary) => line.state === 'failed' || line.state === 'cancelled',
} as const;
type Shown = keyof typeof shown;
const orders = {
  newest: (a: ReadoutSummary, b: ReadoutSummary) => b.number - a.number,
  oldest: (a: ReadoutSummary, b: ReadoutSummary) => a.number - b.number,
  largest: (a: ReadoutSummary, b: ReadoutSummary) => (b.r2 ?? -Infinity) - (a.r2 ?? -Infinity),
} as const;
type Order = keyof typeof orders;

function wordClass(line: ReadoutSummary): string | undefined {
  if (line.state === 'failed' || line.verdictKind === 'worse') return 'w-not';
  if (line.state !== 'done') return 'quiet';
  return line.verdictKind === 'explained' ? 'w-warn' : undefined;
}

const verdictWords: Record<NonNullable<ReadoutSummary['verdictKind']>, string> = {
  carries: 'carries it',
  doesNot: 'does not carry it',
  cannotTell: 'cannot tell',
  explained: 'carried, but explained',
  worse: 'worse than the mean',
};

/** The verdict in a few words; for what has none, how it stands. */
function ending(line: ReadoutSummary): string {
  return line.verdictKind === null ? line.statusLine : verdictWords[line.verdictKind];
}

/** Every readout ever tried on a session, on one common axis. Nothing can be removed from it. */
export function AttemptLedger({
  sessionId,
  lines,
  manyLabels,
  fileName,
}: {
  sessionId: string;
  lines: readonly ReadoutSummary[];
  /** Whether the session has more than one label, so that each line names its own. */
  manyLabels: boolean;
  fileName: string;
}) {
  const router = useRouter();
  const [show, setShow] = useState<Shown>('all');
  const [author, setAuthor] = useState('anyone');
  const [order, setOrder] = useState<Order>('newest');
  const states = useMemo(() => new Map(lines.map((line) => [line.id, line.state])), [lines]);
  useLiveEvents(sessionId, {
    // Progress alone does not change a line; a new state does, and so does a readout that is not listed yet.
    onEvent: (event) => {
      if (event.kind === 'readout' && states.get(event.readoutId) !== event.state) router.refresh();
    },
    onPoll: () => {
      if (lines.some(shown.running)) router.refresh();
    },
  });
  const authors = [...new Set(lines.map((line) => line.authorName))].sort();
  const visible = lines
    .filter((line) => shown[show](line) && (author === 'anyone' || line.authorName === author))
    .sort(orders[order]);
  const axis = sharedAxis(lines.map((line) => ({ value: line.r2, interval: line.r2Interval })));
  const width = 250;
  const count = (key: Shown): number => lines.filter(shown[key]).length;
  return (
    <>
      <p className="filters">
        Showing{' '}
        <PickSelect
          label="Which readouts"
          value={show}
          onChange={setShow}
          options={[
            { value: 'all', text: `all ${lines.length}` },
            { value: 'done', text: `the ${count('done')} with a result` },
            { value: 'running', text: `the ${count('running')} not done yet` },
            { value: 'ended', text: `the ${count('ended')} failed or cancelled` },
          ]}
        />{' '}
        by{' '}
        <PickSelect
          label="Whose readouts"
          value={author}
          onChange={setAuthor}
          options={['anyone', ...authors].map((name) => ({ value: name, text: name }))}
        />
        ,{' '}
        <PickSelect
          label="Order"
          value={order}
          onChange={setOrder}
          options={[
            { value: 'newest', text: 'newest first' },
            { value: 'oldest', text: 'oldest first' },
            { value: 'largest', text: 'largest R² first' },
          ]}
        />
        . Nothing can be removed from this list.
      </p>
      <div className="scroll" tabIndex={0} role="region" aria-label="Table of attempts">
        <table className="stack ledger" role="table">
          <caption className="vh">Attempt ledger</caption>
          <thead role="rowgroup">
            <tr role="row">
              <th scope="col" role="columnheader" className="num">
                No.
              </th>
              <th scope="col" role="columnheader">
                Made
              </th>
              <th scope="col" role="columnheader">
                By
              </th>
              <th scope="col" role="columnheader">
                Recipe
              </th>
              <th scope="col" role="columnheader" className="num">
                R²
              </th>
              <th scope="col" role="columnheader" style={{ width: width + 14 }}>
                <IntervalAxis axis={axis} width={width} />
              </th>
              <th scope="col" role="columnheader" className="num">
                p<span className="u">shuffled</span>
              </th>
              <th scope="col" role="columnheader">
                Verdict
              </th>
              <th scope="col" role="columnheader">
                Kind
              </th>
            </tr>
          </thead>
          <tbody role="rowgroup">
            {visible.map((line) => (
              <tr key={line.id} role="row" className={line.state === 'done' ? 'flush' : 'flush out'}>
                <td role="cell" className="n">
                  <Link href={`/readouts/${line.id}`} aria-label={`Readout ${line.number}`}>
                    {line.number}
                  </Link>
                </td>
                <td role="cell" className="n" style={{ textAlign: 'left' }}>
                  {formatInstant(line.createdAt)
                    .replace(' UTC', '')
                    .replace(/ \d{4},/, ',')}
                </td>
                <td role="cell">{line.authorName}</td>
                <td role="cell" style={{ lineHeight: 1.3, paddingBlock: 3 }}>
                  {manyLabels && <span className="quiet">{line.label}: </span>}
                  {numbers(line.recipeLine)}
                </td>
                <td role="cell" className="n" style={{ fontWeight: 600 }}>
                  {line.r2 === null ? '' : formatNumber(line.r2)}
                </td>
                <td role="cell" className="iv">
                  <IntervalGlyph
                    value={line.r2}
                    interval={line.r2Interval}
                    nullInterval={line.nullInterval}
                    mark={markOfVerdict(line.verdictKind)}
                    axis={axis}
                    width={width}
                  />
                </td>
                <td role="cell" className="n">
                  {line.p === null ? '' : formatP(line.p)}
                </td>
                <td
                  role="cell"
                  className={wordClass(line)}
                  style={{
                    fontWeight: 400,
                    lineHeight: 1.3,
                    whiteSpace: line.verdictKind === null ? undefined : 'nowrap',
                  }}
                >
                  {numbers(ending(line))}
                </td>
                <td role="cell" className="quiet">
                  exploratory
                </td>
              </tr>
            ))}
          </tbody>
        </table>
      </div>
      {visible.length === 0 && (
        <p className="say">No readout of this kind. Change a word of the sentence above.</p>
      )}
      <p className="cap">
        Bars: 95 % interval by nested cross-validation, of readouts fitted like these; broken, because none of
        these recipes was frozen before it ran. Hatched shelves hold the middle 95 % of that readout’s
        shuffles; arrows run off the axis. Filled disc: carried; open: not told from the null; half: a
        nuisance explains it; wedge: worse than the mean. Times in UTC.{' '}
        <SaveCsv
          name="attempt ledger"
          fileName={`${fileName}-ledger`}
          columns={[
            'number',
            'made',
            'by',
            'label',
            'recipe',
            'state',
            'R²',
            '95 % low',
            '95 % high',
            'null 2.5 %',
            'null 97.5 %',
            'p',
            'verdict',
            'data version',
          ].map((name) => ({ name }))}
          rows={() =>
            visible.map((line) => [
              line.number,
              line.createdAt,
              line.authorName,
              line.label,
              line.recipeLine,
              line.state,
              line.r2,
              line.r2Interval?.low ?? null,
              line.r2Interval?.high ?? null,
              line.nullInterval?.low ?? null,
              line.nullInterval?.high ?? null,
              line.p,
              ending(line),
              line.dataVersion,
            ])
          }
        />
      </p>
    </>
  );
}
