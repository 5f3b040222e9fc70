'use client';
import { useMemo, useState } from 'react';
import { FoldStrip } from '@/components/fold-strip/fold-strip';
import type { StripData } from '@/components/fold-strip/strip-data';
import type { SheetColumn } from '@/components/session/sheet-column';
import { PickSelect } from '@/components/ui/pick-select';

/** The session's strip with the label and the column that a member chooses to see. */
export function SessionStrip({
  sessionId,
  name,
  nTrials,
  labels,
  columns,
  block,
  excluded,
  mayExclude,
}: {
  sessionId: string;
  name: string;
  nTrials: number;
  labels: readonly string[];
  columns: readonly SheetColumn[];
  block: { name: string; values: readonly (string | number | null)[] } | null;
  excluded: StripData['excluded'];
  mayExclude: boolean;
}) {
  const [label, setLabel] = useState(labels[0] ?? '');
  const [column, setColumn] = useState('');
  const data = useMemo<StripData>(() => {
    const valuesOf = (wanted: string): (number | null)[] | null => {
      const found = columns.find((candidate) => candidate.name === wanted);
      return found ? found.values.map((value) => (typeof value === 'number' ? value : null)) : null;
    };
    const labelValues = valuesOf(label);
    const columnValues = valuesOf(column);
    return {
      nTrials,
      label: labelValues && { name: label, values: labelValues },
      folds: null,
      predicted: null,
      excluded,
      block,
      column: columnValues && { name: column, values: columnValues },
    };
  }, [nTrials, label, column, columns, block, excluded]);
  const others = columns.filter((candidate) => candidate.type !== 'category' && candidate.name !== label);
  return (
    <>
      {(labels.length > 1 || others.length > 0) && (
        <p className="filters" style={{ marginBottom: 4 }}>
          Showing{' '}
          {labels.length > 1 ? (
            <PickSelect
              label="Label of the strip"
              value={label}
              onChange={setLabel}
              options={labels.map((value) => ({ value, text: value }))}
            />
          ) : (
            label
          )}
          {others.length > 0 && (
            <>
              {' '}
              and{' '}
              <PickSelect
                label="One more column"
                value={column}
                onChange={setColumn}
                options={[
                  { value: '', text: 'no other column' },
                  ...others.map((candidate) => ({ value: candidate.name, text: candidate.name })),
                ]}
              />
            </>
          )}
          .
        </p>
      )}
      <FoldStrip data={data} name={name} sessionId={sessionId} mayExclude={mayExclude} />
    </>
  );
}
