'use client';
import { useRouter } from 'next/navigation';
import { useMemo, useState } from 'react';
import { LeaveOutForm } from '@/components/fold-strip/leave-out-form';
import { UnitTable } from '@/components/session/unit-table';
import type { UnitRow } from '@/components/session/unit-row';
import { Button } from '@/components/ui/button';
import { numbers } from '@/components/ui/numbers';
import { PickSelect } from '@/components/ui/pick-select';
import { formatPlural } from '@/lib/format/format-plural';

type Which = 'all' | 'in' | 'out';

function readNumber(text: string): number | null {
  const value = Number(text.replace(',', '.'));
  return text.trim() === '' || !Number.isFinite(value) || value < 0 ? null : value;
}

/** Units with their sentence of filters, the rule that leaves out, and ticks by hand; each with a reason. */
export function UnitSection({
  sessionId,
  rows,
  columns,
  mayExclude,
  fileName,
}: {
  sessionId: string;
  rows: readonly UnitRow[];
  columns: readonly { name: string; isNumeric: boolean }[];
  mayExclude: boolean;
  fileName: string;
}) {
  const router = useRouter();
  const [which, setWhich] = useState<Which>('all');
  const [area, setArea] = useState('any');
  const [changing, setChanging] = useState<ReadonlySet<number>>(new Set());
  const [minRate, setMinRate] = useState('1');
  const [minPresence, setMinPresence] = useState('0.9');
  const [done, setDone] = useState<string | null>(null);

  const areaPlace = columns.findIndex((column) => /^(area|region)$/i.test(column.name) && !column.isNumeric);
  const areas = useMemo(
    () =>
      areaPlace < 0
        ? []
        : [
            ...new Set(rows.map((row) => row.values[areaPlace]).filter((value) => typeof value === 'string')),
          ].sort(),
    [rows, areaPlace],
  );
  const visible = rows.filter(
    (row) =>
      (which === 'all' || (row.out === null) === (which === 'in')) &&
      (area === 'any' || row.values[areaPlace] === area),
  );
  const leaving = rows.filter((row) => changing.has(row.unit) && row.out === null).map((row) => row.unit);
  const returning = rows.filter((row) => changing.has(row.unit) && row.out !== null).map((row) => row.unit);
  const least = { rate: readNumber(minRate), presence: readNumber(minPresence) };
  const failing = rows.filter(
    (row) =>
      row.out === null &&
      ((least.rate !== null && row.rateHz < least.rate) ||
        (least.presence !== null && row.presence < least.presence)),
  );
  const nIn = rows.filter((row) => row.out === null).length;
  const toggle = (unit: number): void => {
    const next = new Set(changing);
    if (!next.delete(unit)) next.add(unit);
    setDone(null);
    setChanging(next);
  };
  const action = leaving.length > 0 ? 'leaveOut' : 'putBack';
  const indices = leaving.length > 0 ? leaving : returning;

  return (
    <>
      <p className="filters">
        Showing{' '}
        <PickSelect
          label="Which units"
          value={which}
          onChange={setWhich}
          options={[
            { value: 'all', text: `all ${rows.length} units` },
            { value: 'in', text: `the ${nIn} units that are in` },
            { value: 'out', text: `the ${rows.length - nIn} left out` },
          ]}
        />
        {areas.length > 1 && (
          <>
            {' '}
            of{' '}
            <PickSelect
              label="Area"
              value={area}
              onChange={setArea}
              options={[
                { value: 'any', text: 'any area' },
                ...areas.map((name) => ({
                  value: name,
                  text: `${name}, ${rows.filter((row) => row.values[areaPlace] === name).length}`,
                })),
              ]}
            />
          </>
        )}
        .
        {mayExclude && (
          <>
            {' '}
            By rule: rate at least{' '}
            <input
              className="pick number-pick"
              inputMode="decimal"
              aria-label="Least rate, spikes/s"
              value={minRate}
              onChange={(event) => setMinRate(event.target.value)}
            />{' '}
            spikes/s and presence at least{' '}
            <input
              className="pick number-pick"
              inputMode="decimal"
              aria-label="Least presence"
              value={minPresence}
              onChange={(event) => setMinPresence(event.target.value)}
            />{' '}
            <span aria-live="polite">
              {numbers(`keeps ${nIn - failing.length} of the ${nIn} that are in.`)}
            </span>{' '}
            {failing.length > 0 && (
              <Button
                kind="link"
                onClick={() => {
                  setDone(null);
                  setChanging(new Set(failing.map((row) => row.unit)));
                }}
              >
                {numbers(`Choose the other ${failing.length}`)}
              </Button>
            )}
          </>
        )}
      </p>
      <UnitTable
        rows={visible}
        columns={columns}
        changing={changing}
        onToggle={mayExclude ? toggle : undefined}
        fileName={fileName}
      />
      {indices.length > 0 && (
        <LeaveOutForm
          key={action}
          sessionId={sessionId}
          kind="units"
          action={action}
          indices={indices}
          takesFocus={false}
          onCancel={() => setChanging(new Set())}
          onDone={(reason) => {
            setDone(
              `${formatPlural(indices.length, 'unit')} ${action === 'leaveOut' ? 'left out' : 'put back'}: ${reason}. Readouts made so far keep what they used.`,
            );
            setChanging(new Set([...changing].filter((unit) => !indices.includes(unit))));
            router.refresh();
          }}
        />
      )}
      {done && indices.length === 0 && (
        <p className="say" role="status" style={{ marginTop: 8 }}>
          {numbers(done)}
        </p>
      )}
    </>
  );
}
