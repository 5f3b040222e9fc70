import Link from 'next/link';
import type { ReactNode } from 'react';
import { IntervalGlyph, type IntervalAxisRange } from '@/components/charts/interval-glyph';
import type { ForestRow } from '@/components/study/forest-row';
import { sessionStateWords } from '@/components/study/session-state-words';
import { verdictWords } from '@/components/study/verdict-words';
import type { ReadoutSummary } from '@/lib/contracts/readout';
import { formatCount } from '@/lib/format/format-count';
import { formatNumber } from '@/lib/format/format-number';
import { formatP } from '@/lib/format/format-p';

/** A column of the sessions table. `readout` is the one of the chosen label; null where the session has none. */
export interface ForestColumn {
  key: string;
  head: string;
  unit?: string;
  numeric?: boolean;
  cellClass: string;
  value?: (row: ForestRow, readout: ReadoutSummary | null) => string | number | null;
  cell: (row: ForestRow, readout: ReadoutSummary | null, animalCode: string) => ReactNode;
}

const readoutColumns = new Set(['r2', 'interval', 'p', 'verdict']);

/** Under its animal a session needs only the rest of its name. */
function shortName(name: string, animalCode: string): string {
  return name.startsWith(`${animalCode}, `) ? name.slice(animalCode.length + 2) : name;
}

/** The columns of the sessions table; those of readouts only where there are any. */
export function forestColumns({
  axis,
  glyphPx,
  hasReadouts,
}: {
  axis: IntervalAxisRange;
  glyphPx: number;
  hasReadouts: boolean;
}): ForestColumn[] {
  const columns: ForestColumn[] = [
    {
      key: 'day',
      head: 'Session',
      unit: 'by day',
      cellClass: 'c-session',
      value: (row) => row.startedAt,
      cell: (row, _readout, code) => (
        <Link href={`/sessions/${row.sessionId}`}>{shortName(row.name, code)}</Link>
      ),
    },
    {
      key: 'units',
      head: 'Units',
      numeric: true,
      cellClass: 'n c-units',
      value: (row) => row.units,
      cell: (row) => (row.units === null ? '' : formatCount(row.units)),
    },
    {
      key: 'trials',
      head: 'Trials',
      numeric: true,
      cellClass: 'n c-trials',
      value: (row) => row.trials,
      cell: (row) => (row.trials === null ? '' : formatCount(row.trials)),
    },
    {
      key: 'r2',
      head: 'R²',
      numeric: true,
      cellClass: 'n c-r2',
      value: (_row, readout) => readout?.r2 ?? null,
      cell: (_row, readout) => (readout ? <b>{formatNumber(readout.r2)}</b> : ''),
    },
    {
      key: 'interval',
      head: 'R², held-out',
      cellClass: 'iv',
      cell: (_row, readout) => (
        <IntervalGlyph
          value={readout?.r2 ?? null}
          interval={readout?.r2Interval ?? null}
          nullInterval={readout?.nullInterval ?? null}
          mark={readout?.verdictKind ? verdictWords[readout.verdictKind].mark : 'open'}
          axis={axis}
          width={glyphPx}
          emptyText="not read out yet"
        />
      ),
    },
    {
      key: 'p',
      head: 'p',
      unit: 'shuffled',
      numeric: true,
      cellClass: 'n c-p',
      value: (_row, readout) => readout?.p ?? null,
      cell: (_row, readout) => (readout ? formatP(readout.p) : ''),
    },
    {
      key: 'verdict',
      head: 'Reading',
      cellClass: 'c-verdict',
      value: (_row, readout) => (readout?.verdictKind ? verdictWords[readout.verdictKind].text : null),
      cell: (_row, readout) => {
        if (!readout?.verdictKind) return '';
        const words = verdictWords[readout.verdictKind];
        return <span className={words.className}>{words.text}</span>;
      },
    },
    {
      key: 'made',
      head: 'Made',
      unit: 'readouts',
      numeric: true,
      cellClass: 'n c-made',
      value: (row) => row.nReadouts,
      cell: (row) => formatCount(row.nReadouts),
    },
    {
      key: 'state',
      head: 'State',
      cellClass: 'c-state',
      value: (row) => row.state,
      cell: (row) => (
        <span className={sessionStateWords[row.state].className}>{sessionStateWords[row.state].text}</span>
      ),
    },
  ];
  return hasReadouts ? columns : columns.filter((column) => !readoutColumns.has(column.key));
}
