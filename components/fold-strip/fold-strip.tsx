'use client';
import { useRouter } from 'next/navigation';
import {
  useCallback,
  useEffect,
  useMemo,
  useRef,
  useState,
  type KeyboardEvent,
  type PointerEvent,
} from 'react';
import { useTrialCursor, useTrialCursorStore } from '@/components/charts/trial-cursor';
import { blockStarts } from '@/components/fold-strip/block-starts';
import { foldRuns } from '@/components/fold-strip/fold-runs';
import styles from '@/components/fold-strip/fold-strip.module.css';
import { LeaveOutForm } from '@/components/fold-strip/leave-out-form';
import { StripFolded } from '@/components/fold-strip/strip-folded';
import type { StripData } from '@/components/fold-strip/strip-data';
import { StripLanes } from '@/components/fold-strip/strip-lanes';
import { stripLayout } from '@/components/fold-strip/strip-layout';
import { StripMarks } from '@/components/fold-strip/strip-marks';
import { valueLine } from '@/components/fold-strip/value-line';
import { Button } from '@/components/ui/button';
import { numbers } from '@/components/ui/numbers';
import { formatPlural } from '@/lib/format/format-plural';

/**
 * The trials of a session in time order. One tab stop; Left/Right trial, PageUp/PageDown block, Home/End, Shift with any
 * of them chooses a range, f next fold, x leave the choice out, Esc lets go. The page's plots follow its cursor.
 */
export function FoldStrip({
  data,
  name,
  sessionId,
  mayExclude,
}: {
  data: StripData;
  /** Said when the strip has folded to a line at the top of the window. */
  name: string;
  sessionId: string;
  mayExclude: boolean;
}) {
  const router = useRouter();
  const store = useTrialCursorStore();
  const at = useTrialCursor((state) => state.at);
  const range = useTrialCursor((state) => state.range);
  const [asking, setAsking] = useState(false);
  const [done, setDone] = useState<string | null>(null);
  const area = useRef<HTMLDivElement>(null);
  const roll = useRef<HTMLDivElement>(null);
  const anchor = useRef<number | null>(null);
  const drag = useRef<number | null>(null);

  const layout = useMemo(() => stripLayout(data), [data]);
  const runs = useMemo(() => (data.folds ? foldRuns(data.folds.values, data.folds.nFolds) : null), [data]);
  const starts = useMemo(() => (data.block ? blockStarts(data.block.values) : [0]), [data]);
  const n = data.nTrials;

  const trialAt = useCallback(
    (clientX: number): number => {
      const box = area.current?.getBoundingClientRect();
      const px = clientX - (box?.left ?? 0) - layout.left;
      return Math.max(0, Math.min(n - 1, Math.floor(px / layout.pxPerTrial)));
    },
    [layout, n],
  );
  const keepInSight = (trial: number): void => {
    const box = roll.current;
    if (!box) return;
    const x = layout.left + trial * layout.pxPerTrial;
    if (x < box.scrollLeft + 40) box.scrollLeft = x - 80;
    else if (x > box.scrollLeft + box.clientWidth - 40) box.scrollLeft = x - box.clientWidth + 80;
  };
  const move = (trial: number, choose: boolean): void => {
    const to = Math.max(0, Math.min(n - 1, trial));
    if (choose) {
      anchor.current ??= at ?? to;
      store.set({ at: to, range: [Math.min(anchor.current, to), Math.max(anchor.current, to)] });
    } else {
      anchor.current = null;
      store.set({ at: to });
    }
    keepInSight(to);
  };
  const letGo = (): void => {
    anchor.current = null;
    setAsking(false);
    store.set({ range: null, fold: null });
    area.current?.focus({ preventScroll: true });
  };
  const nextBlock = (from: number): number => {
    if (!data.block) return from + Math.max(10, Math.round(n / 8));
    return starts.find((start) => start > from) ?? n - 1;
  };
  const previousBlock = (from: number): number => {
    if (!data.block) return from - Math.max(10, Math.round(n / 8));
    return starts.findLast((start) => start < from) ?? 0;
  };
  const onKeyDown = (event: KeyboardEvent): void => {
    if (event.ctrlKey || event.metaKey || event.altKey) return;
    const from = at ?? 0;
    const steps: Record<string, number> = {
      ArrowLeft: at === null ? 0 : from - 1,
      ArrowRight: at === null ? 0 : from + 1,
      PageUp: previousBlock(from),
      PageDown: nextBlock(from),
      Home: 0,
      End: n - 1,
    };
    if (event.key in steps) move(steps[event.key], event.shiftKey);
    else if (event.key === 'f' && data.folds) {
      const now = store.get().fold;
      store.set({ fold: now === null ? 0 : now + 1 < data.folds.nFolds ? now + 1 : null });
    } else if (event.key === 'x' && mayExclude && (range || at !== null)) {
      if (!range && at !== null) store.set({ range: [at, at] });
      setAsking(true);
    } else if (event.key === 'Escape') letGo();
    else return;
    event.preventDefault();
  };
  const onPointerDown = (event: PointerEvent): void => {
    if (event.button !== 0) return;
    drag.current = trialAt(event.clientX);
    store.set({ at: drag.current, range: null });
    setAsking(false);
    if (event.pointerType !== 'touch') event.currentTarget.setPointerCapture(event.pointerId);
  };
  const onPointerMove = (event: PointerEvent): void => {
    const trial = trialAt(event.clientX);
    if (drag.current === null || event.pointerType === 'touch') store.set({ at: trial });
    else if (Math.abs(trial - drag.current) > 1)
      store.set({ at: trial, range: [Math.min(drag.current, trial), Math.max(drag.current, trial)] });
  };

  // A new set of trials (another data version, a refresh after leaving out) must not keep a cursor beyond its end.
  useEffect(() => {
    const state = store.get();
    if (state.at !== null && state.at >= n) store.set({ at: n - 1 });
    if (state.range && state.range[1] >= n) store.set({ range: null });
  }, [n, store]);

  const spoken = at === null ? 'no trial chosen' : valueLine(data, at);
  const outNow = new Set(data.excluded.map((entry) => entry.trial));
  const chosen = range ? Array.from({ length: range[1] - range[0] + 1 }, (_, k) => range[0] + k) : [];
  const chosenIn = chosen.filter((trial) => !outNow.has(trial));
  const chosenOut = chosen.filter((trial) => outNow.has(trial));
  const [action, subject] =
    chosenIn.length === 0 && chosenOut.length > 0
      ? (['putBack', chosenOut] as const)
      : (['leaveOut', chosenIn] as const);

  return (
    <div>
      <p className={styles.line}>
        <span className="n">{at === null ? '' : spoken}</span>
      </p>
      <div className={styles.roll} ref={roll}>
        <div
          ref={area}
          className={`strip ${styles.area}`}
          role="slider"
          tabIndex={0}
          aria-label="Fold strip, trials in time order"
          aria-orientation="horizontal"
          aria-valuemin={1}
          aria-valuemax={n}
          aria-valuenow={(at ?? 0) + 1}
          aria-valuetext={range ? `${spoken}. ${chosen.length} trials chosen` : spoken}
          onKeyDown={onKeyDown}
          onPointerDown={onPointerDown}
          onPointerMove={onPointerMove}
          onPointerUp={() => (drag.current = null)}
          onPointerCancel={() => (drag.current = null)}
        >
          <svg
            width={layout.width}
            height={layout.height}
            viewBox={`0 0 ${layout.width} ${layout.height}`}
            aria-hidden="true"
          >
            <StripLanes data={data} layout={layout} runs={runs} starts={starts} />
            <StripMarks layout={layout} folds={data.folds?.values ?? null} runs={runs} />
          </svg>
        </div>
      </div>
      <div className={styles.acts} aria-live="polite">
        {range && !asking && (
          <>
            <span>
              {numbers(`${formatPlural(chosen.length, 'trial')} chosen, ${range[0] + 1} to ${range[1] + 1}`)}
            </span>
            {mayExclude && subject.length > 0 && (
              <Button kind="link" onClick={() => setAsking(true)}>
                {numbers(
                  `${action === 'leaveOut' ? 'Leave out' : 'Put back'} ${formatPlural(subject.length, 'trial')}`,
                )}
              </Button>
            )}
            <Button kind="link" onClick={letGo}>
              Let go
            </Button>
          </>
        )}
        {!range && done && <span className="say">{numbers(done)}</span>}
      </div>
      {range && asking && (
        <LeaveOutForm
          sessionId={sessionId}
          kind="trials"
          action={action}
          indices={subject}
          onCancel={letGo}
          onDone={(reason) => {
            setDone(
              `${formatPlural(subject.length, 'trial')} ${action === 'leaveOut' ? 'left out' : 'put back'}: ${reason}. Readouts made so far keep what they used.`,
            );
            letGo();
            router.refresh();
          }}
        />
      )}
      <StripFolded data={data} layout={layout} runs={runs} name={name} watch={roll} />
    </div>
  );
}
