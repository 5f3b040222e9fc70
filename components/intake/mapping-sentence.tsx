'use client';

import { NumberPick } from '@/components/intake/number-pick';
import { PickSelect } from '@/components/ui/pick-select';
import { axisOrders } from '@/lib/client/intake/axis-orders';
import type { IntakeDraft } from '@/lib/client/intake/intake-draft';
import type { UsedArray } from '@/lib/client/intake/used-arrays';
import type { CountsAxis } from '@/lib/contracts/intake';

const words = (axes: readonly CountsAxis[]) => axes.join(' × ');

/** The rest of the mapping as one sentence with words to change: axes, bins, and which columns are labels. */
export function MappingSentence({
  draft,
  used,
  onChange,
}: {
  draft: IntakeDraft;
  used: readonly UsedArray[];
  onChange: (change: Partial<IntakeDraft>) => void;
}) {
  const counts = used.find(({ use }) => use.kind === 'counts');
  const isTable = counts?.file.format === 'csv' || used.some(({ use }) => use.kind === 'long');
  const nAxes = counts?.array.shape.length === 2 ? 2 : 3;
  const axes = nAxes === 2 ? draft.axes.filter((axis) => axis !== 'bin') : draft.axes;
  const labels = used.filter(({ use }) => use.kind === 'label');
  return (
    <p className="filters">
      Counts run over{' '}
      {counts && !isTable ? (
        <PickSelect
          label="Order of the counts’ axes"
          value={words(axes)}
          options={axisOrders(nAxes).map((order) => ({ value: words(order), text: words(order) }))}
          onChange={(value) => {
            const order = axisOrders(nAxes).find((candidate) => words(candidate) === value);
            if (order) onChange({ axes: nAxes === 2 ? [...order, 'bin'] : order });
          }}
        />
      ) : (
        'trial × unit × bin'
      )}
      {isTable ? (
        <>
          {' '}
          as the table names them, numbered from{' '}
          <PickSelect
            label="First number of trials, units and bins"
            value={draft.base === undefined ? 'tell' : String(draft.base)}
            options={[
              { value: 'tell', text: 'whichever the table shows' },
              { value: '0', text: '0' },
              { value: '1', text: '1' },
            ]}
            onChange={(value) => onChange({ base: value === '0' ? 0 : value === '1' ? 1 : undefined })}
          />
        </>
      ) : null}
      {used.some(({ use }) => use.kind === 'long') ? (
        <>
          , in all{' '}
          {(['trial', 'unit', 'bin'] as const).map((axis, index) => (
            <span key={axis}>
              {index === 0 ? '' : index === 2 ? ' and ' : ', '}
              <NumberPick
                label={`Number of ${axis}s; empty lets the rows tell`}
                isOptional
                value={draft.longShape[axis]}
                onChange={(value) => onChange({ longShape: { ...draft.longShape, [axis]: value } })}
              />{' '}
              {axis}s
            </span>
          ))}
        </>
      ) : null}
      , bins of{' '}
      <NumberPick
        label="Bin width, ms"
        value={draft.binWidthMs}
        onChange={(binWidthMs) => onChange({ binWidthMs })}
      />{' '}
      ms, the first from{' '}
      <NumberPick
        label="Start of the first bin, ms from the alignment event"
        value={draft.windowStartMs}
        onChange={(windowStartMs) => onChange({ windowStartMs })}
      />{' '}
      ms relative to the alignment event;{' '}
      {labels.length === 0 ? (
        'no label is chosen yet.'
      ) : (
        <>
          {labels.length === 1 ? 'the label is ' : 'the labels are '}
          {labels.map(({ name, use }, index) => (
            <span key={name}>
              {index === 0 ? '' : index === labels.length - 1 ? ' and ' : ', '}
              <b>{name}</b>
              {use.kind === 'label' && use.labelKind !== 'other' ? ` (${use.labelKind})` : ''}
            </span>
          ))}
          .
        </>
      )}
    </p>
  );
}
