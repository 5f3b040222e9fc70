'use client';
import { useEffect, useState, type RefObject } from 'react';
import { useTrialCursor } from '@/components/charts/trial-cursor';
import { foldColour } from '@/components/fold-strip/fold-colour';
import type { FoldRun } from '@/components/fold-strip/fold-runs';
import type { StripData } from '@/components/fold-strip/strip-data';
import type { StripLayout } from '@/components/fold-strip/strip-layout';

/**
 * The strip folded to a line under the window's top edge while the real one is scrolled away: folds, exclusions, choice
 * and cursor. For the eye only; the keyboard and the spoken value stay with the strip itself.
 */
export function StripFolded({
  data,
  layout,
  runs,
  name,
  watch,
}: {
  data: StripData;
  layout: StripLayout;
  runs: readonly FoldRun[] | null;
  name: string;
  watch: RefObject<HTMLDivElement | null>;
}) {
  const [shown, setShown] = useState(false);
  useEffect(() => {
    const element = watch.current;
    if (!element) return;
    const observer = new IntersectionObserver(([entry]) =>
      setShown(!entry.isIntersecting && entry.boundingClientRect.top < 0),
    );
    observer.observe(element);
    return () => observer.disconnect();
  }, [watch]);
  if (!shown) return null;
  const x = (trial: number): number => layout.left + trial * layout.pxPerTrial;
  const height = 18;
  const folds = data.folds;
  const step = folds ? height / folds.nFolds : 0;
  return (
    <div className="mini on" aria-hidden="true">
      <div>
        <b>{name}</b>
        <div style={{ overflow: 'hidden' }}>
          <svg width={layout.width} height="24" viewBox={`0 0 ${layout.width} 24`}>
            {folds && (
              <text className="lab" x="0" y="13">
                fold
              </text>
            )}
            {runs?.map(({ fold, from, to }) => (
              <rect
                key={fold}
                x={x(from)}
                y={fold * step}
                width={(to - from) * layout.pxPerTrial}
                height={Math.max(1, step - 0.8)}
                style={{ fill: foldColour(fold) }}
              />
            ))}
            {folds && !runs && <FoldedWeave values={folds.values} nFolds={folds.nFolds} step={step} x={x} />}
            <path
              style={{ stroke: 'var(--ink)', strokeWidth: 1.3 }}
              d={data.excluded.map(({ trial }) => `M${x(trial + 0.5)} 20v4`).join('')}
            />
            <FoldedMarks x={x} />
          </svg>
        </div>
      </div>
    </div>
  );
}

function FoldedWeave({
  values,
  nFolds,
  step,
  x,
}: {
  values: readonly (number | null)[];
  nFolds: number;
  step: number;
  x: (trial: number) => number;
}) {
  return Array.from({ length: nFolds }, (_, fold) => (
    <path
      key={fold}
      style={{ stroke: foldColour(fold), strokeWidth: 1.2, fill: 'none' }}
      d={values
        .map((value, trial) =>
          value === fold
            ? `M${x(trial + 0.5).toFixed(1)} ${(fold * step).toFixed(1)}v${Math.max(1, step - 0.6).toFixed(1)}`
            : '',
        )
        .join('')}
    />
  ));
}

function FoldedMarks({ x }: { x: (trial: number) => number }) {
  const at = useTrialCursor((state) => state.at);
  const range = useTrialCursor((state) => state.range);
  return (
    <>
      {range && <path className="inkl" d={`M${x(range[0])} -1V23H${x(range[1] + 1)}V-1`} />}
      {at !== null && (
        <path
          transform={`translate(${x(at + 0.5)} 0)`}
          d="M0 -2V24"
          style={{ stroke: 'var(--focus-ink)', strokeWidth: 1.4 }}
        />
      )}
    </>
  );
}
