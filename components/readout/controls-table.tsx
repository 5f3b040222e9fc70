'use client';
import { Fragment, useState } from 'react';
import { IntervalAxis } from '@/components/charts/interval-axis';
import { IntervalGlyph, type IntervalMark } from '@/components/charts/interval-glyph';
import { NullHistogram } from '@/components/charts/null-histogram';
import { sharedAxis } from '@/components/charts/shared-axis';
import type { ControlNumbers } from '@/components/readout/control-numbers';
import { SaveCsv } from '@/components/session/save-csv';
import { numbers } from '@/components/ui/numbers';
import { formatInterval } from '@/lib/format/format-interval';
import { formatNumber } from '@/lib/format/format-number';
import { formatP } from '@/lib/format/format-p';

const words = {
  survives: { text: 'Survives.', className: 'w-holds' },
  fails: { text: 'Does not survive.', className: 'w-not' },
  cannotTell: { text: 'Cannot tell.', className: 'w-tell' },
} as const;
const rivals = new Set(['nuisanceOnly', 'totalRate', 'trialOrder']);
const width = 236;

function markOf(control: ControlNumbers): IntervalMark {
  if (rivals.has(control.kind)) return 'nuisanceOnly';
  return control.null?.p != null && control.null.p <= 0.05 && (control.r2 ?? 0) > 0 ? 'carried' : 'open';
}

function nullIntervalOf(control: ControlNumbers): { low: number; high: number } | null {
  const low = control.null?.quantiles.q025 ?? null;
  const high = control.null?.quantiles.q975 ?? null;
  return low === null || high === null ? null : { low, high };
}

/** The controls that could have killed the readout: question, result, what it means; each opens its own plot. */
export function ControlsTable({
  controls,
  scheme,
  fileName,
}: {
  controls: readonly ControlNumbers[];
  scheme: string;
  fileName: string;
}) {
  const [open, setOpen] = useState<number | null>(null);
  const axis = sharedAxis(controls.map((control) => ({ value: control.r2, interval: control.interval })));
  return (
    <>
      <div className="scroll" tabIndex={0} role="region" aria-label="Table of controls">
        <table className="stack ctls" role="table">
          <caption className="vh">Controls</caption>
          <thead role="rowgroup">
            <tr role="row">
              <th scope="col" role="columnheader" style={{ width: 290 }}>
                Question
              </th>
              <th scope="col" role="columnheader" style={{ width: width + 16 }}>
                <IntervalAxis axis={axis} width={width} />
              </th>
              <th scope="col" role="columnheader" style={{ width: 190 }}>
                Result<span className="u">95 % test-trial interval</span>
              </th>
              <th scope="col" role="columnheader">
                What it means
              </th>
            </tr>
          </thead>
          <tbody role="rowgroup">
            {controls.map((control, index) => {
              const opens = (control.null?.values?.length ?? 0) > 0 || control.powers !== null;
              return (
                <Fragment key={index}>
                  <tr role="row">
                    <td role="cell" style={{ height: 45, lineHeight: 1.3, paddingBlock: 5 }}>
                      {opens ? (
                        <button
                          type="button"
                          className="linklike"
                          style={{ color: 'var(--ink)' }}
                          aria-expanded={open === index}
                          onClick={() => setOpen(open === index ? null : index)}
                        >
                          {numbers(control.question)}
                        </button>
                      ) : (
                        numbers(control.question)
                      )}
                    </td>
                    <td role="cell" className="iv">
                      <IntervalGlyph
                        value={control.r2}
                        interval={control.interval}
                        nullInterval={nullIntervalOf(control)}
                        mark={markOf(control)}
                        axis={axis}
                        width={width}
                        height={45}
                        emptyText="no single R²"
                      />
                    </td>
                    <td role="cell" className="n" style={{ textAlign: 'left' }}>
                      {control.r2 === null
                        ? ''
                        : `${formatNumber(control.r2)}${control.interval ? ` ${formatInterval(control.interval)}` : ''}`}
                    </td>
                    <td role="cell" style={{ lineHeight: 1.35, paddingBlock: 5 }}>
                      <span className={words[control.outcome].className}>{words[control.outcome].text}</span>{' '}
                      <span className="say">{numbers(control.sentence)}</span>
                    </td>
                  </tr>
                  {open === index && (
                    <tr role="row">
                      <td role="cell" colSpan={4} style={{ height: 'auto', padding: '12px 0 16px' }}>
                        <OpenedControl control={control} scheme={scheme} />
                      </td>
                    </tr>
                  )}
                </Fragment>
              );
            })}
          </tbody>
        </table>
      </div>
      <p className="cap">
        Disc: read out from units; filled, clear of its shuffles; open, not told from them. Ochre square: read
        out without the units, and good when it sits at 0. Hatched shelf: middle 95 % of that control’s own
        shuffles. Bars: interval over held-out trials with the readouts held fixed; for matched trials, the
        spread over draws.{' '}
        <SaveCsv
          name="controls"
          fileName={`${fileName}-controls`}
          columns={[
            'control',
            'question',
            'R²',
            'low',
            'high',
            'p',
            'draws',
            'trials',
            'outcome',
            'sentence',
          ].map((name) => ({ name }))}
          rows={() =>
            controls.map((control) => [
              control.kind,
              control.question,
              control.r2,
              control.interval?.low ?? null,
              control.interval?.high ?? null,
              control.null?.p ?? null,
              control.null?.draws ?? null,
              control.nTrials,
              control.outcome,
              control.sentence,
            ])
          }
        />
      </p>
    </>
  );
}

function OpenedControl({ control, scheme }: { control: ControlNumbers; scheme: string }) {
  if (control.powers)
    return (
      <table style={{ maxWidth: 480 }}>
        <caption className="vh">Power at each injected size</caption>
        <thead>
          <tr>
            <th scope="col" className="num">
              Injected<span className="u">population R²</span>
            </th>
            <th scope="col" className="num">
              Found
            </th>
            <th scope="col" className="num">
              Power
            </th>
            <th scope="col" className="num">
              Mean R²<span className="u">held-out</span>
            </th>
          </tr>
        </thead>
        <tbody>
          {control.powers.map((row) => (
            <tr key={row.size}>
              <td className="n">{formatNumber(row.size, 3)}</td>
              <td className="n">
                {row.detected} of {row.draws}
              </td>
              <td className="n">{formatNumber(row.power)}</td>
              <td className="n">{formatNumber(row.meanR2, 3)}</td>
            </tr>
          ))}
        </tbody>
      </table>
    );
  const { null: shuffles } = control;
  if (!shuffles?.values) return null;
  return (
    <div style={{ maxWidth: 620 }}>
      <NullHistogram
        values={shuffles.values}
        scheme={scheme}
        observed={control.r2}
        interval={control.interval}
        q95={shuffles.quantiles.q95}
        largest={shuffles.quantiles.max}
      />
      <p className="cap">
        {numbers(
          `This control’s held-out R² and its own shuffles; p = ${formatP(shuffles.p)}.${control.nTrials === null ? '' : ` ${control.nTrials} trials.`}${control.intervalMethod ? ` Bar: ${control.intervalMethod}.` : ''}${control.warning ? ` ${control.warning}` : ''}`,
        )}
      </p>
    </div>
  );
}
