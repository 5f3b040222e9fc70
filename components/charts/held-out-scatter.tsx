'use client';
import { useCallback, useEffect, useMemo, useRef } from 'react';
import uPlot from 'uplot';
import 'uplot/dist/uPlot.min.css';
import { axisTicks } from '@/components/charts/axis-ticks';
import { chartNumber } from '@/components/charts/chart-number';
import styles from '@/components/charts/held-out-scatter.module.css';
import { levelTicks } from '@/components/charts/level-ticks';
import { jitter } from '@/components/charts/jitter';
import { PlotCursor } from '@/components/charts/plot-cursor';
import {
  paintDots,
  paintScatter,
  type ScatterDrawing,
  type ScatterLevel,
} from '@/components/charts/scatter-painter';
import { useTrialCursor, useTrialCursorStore } from '@/components/charts/trial-cursor';
import { useThemeChange } from '@/components/charts/use-theme-change';
import { useWidth } from '@/components/charts/use-width';

/** A held-out prediction of one trial (`trial` counts from 0). */
export interface ScatterTrial {
  trial: number;
  label: number;
  predicted: number;
  fold: number;
}

const padding = { top: 24, right: 14, bottom: 46, left: 54 };

/**
 * Held-out prediction against the true label, one dot a trial, with the identity line and, where the label has levels,
 * their means and ±1 SD. The ring is the page's trial cursor; Left/Right walk through the trials in time order.
 */
export function HeldOutScatter({
  trials,
  levels,
  label,
  guess,
}: {
  /** In ascending order of trial. */
  trials: readonly ScatterTrial[];
  levels: readonly ScatterLevel[];
  label: string;
  guess: number | null;
}) {
  const [holder, width] = useWidth<HTMLDivElement>(520);
  const target = useRef<HTMLDivElement>(null);
  const plot = useRef<uPlot | null>(null);
  const ring = useRef<HTMLDivElement>(null);
  const store = useTrialCursorStore();
  const at = useTrialCursor((state) => state.at);
  const range = useTrialCursor((state) => state.range);
  const placeOf = useMemo(() => new Map(trials.map((entry, index) => [entry.trial, index])), [trials]);

  const drawn = useMemo(() => {
    const labels = trials.map((entry) => entry.label);
    const values = trials.map((entry) => entry.predicted);
    // Only a label with levels is spread sideways; moving a continuous one would draw it wrong.
    const hasLevels = levels.length > 1 && new Set(labels).size <= levels.length;
    const spread = hasLevels
      ? Math.min(...levels.slice(1).map((entry, k) => entry.level - levels[k].level))
      : 0;
    const xLow = Math.min(...labels);
    const xHigh = Math.max(...labels);
    const xs = trials.map((entry) => entry.label + jitter(entry.trial) * spread * 0.5);
    const order = xs.map((_, index) => index).sort((a, b) => xs[a] - xs[b]);
    const yTicks = axisTicks(Math.min(xLow, ...values), Math.max(xHigh, ...values), 6);
    const few = levels.length > 1 && levels.length <= 6 && width / levels.length > 55;
    const xTicks =
      hasLevels && few
        ? levelTicks(levels.map((entry) => entry.level))
        : axisTicks(xLow, xHigh, Math.max(2, Math.min(5, Math.floor(width / 90))));
    const pad = Math.max(spread * 0.34, (xHigh - xLow || 1) * 0.04);
    const drawing: ScatterDrawing = {
      xTicks,
      yTicks,
      xTitle: `${label}, true`,
      yTitle: `${label}, held-out`,
      levels,
      identity: [xLow, xHigh],
      guess,
    };
    const xMin = Math.min(xLow - pad, xTicks.values[0]);
    const xMax = Math.max(xHigh + pad, xTicks.values[xTicks.values.length - 1]);
    return {
      xs,
      data: [order.map((k) => xs[k]), order.map((k) => values[k])] as uPlot.AlignedData,
      drawing,
      x: [xMin, xMax] as [number, number],
      y: [yTicks.values[0], yTicks.values[yTicks.values.length - 1]] as [number, number],
    };
  }, [trials, levels, label, guess, width]);

  const placeRing = useCallback((): void => {
    const u = plot.current;
    const mark = ring.current;
    if (!u || !mark) return;
    const place = at === null ? undefined : placeOf.get(at);
    mark.hidden = place === undefined;
    if (place === undefined) return;
    const ratio = devicePixelRatio;
    const left = u.bbox.left / ratio + u.valToPos(drawn.xs[place], 'x');
    const top = u.bbox.top / ratio + u.valToPos(trials[place].predicted, 'y');
    mark.style.transform = `translate(${left}px, ${top}px)`;
  }, [at, placeOf, drawn, trials]);

  const latest = useRef({ range, placeRing });

  useEffect(() => {
    const element = target.current;
    if (!element) return;
    const u = new uPlot(
      {
        width,
        // The frame's height is the style sheet's, so that it is right before the script runs.
        height: element.parentElement?.clientHeight ?? 430,
        padding: [padding.top, padding.right, padding.bottom, padding.left],
        legend: { show: false },
        cursor: { show: false },
        scales: { x: { time: false, range: drawn.x }, y: { range: drawn.y } },
        axes: [{ show: false }, { show: false }],
        series: [{}, { paths: () => null, points: { show: false } }],
        hooks: {
          draw: [
            (self) => {
              const chosen = latest.current.range;
              paintDots(self, trials, drawn.xs, chosen);
              paintScatter(self, drawn.drawing);
              // Scales are only known once uPlot has drawn.
              latest.current.placeRing();
            },
          ],
        },
      },
      drawn.data,
      element,
    );
    plot.current = u;
    // The canvas may have been drawn before the page's own faces were there.
    let alive = true;
    void document.fonts.ready.then(() => alive && u.redraw(false));
    return () => {
      alive = false;
      u.destroy();
      plot.current = null;
    };
  }, [drawn, trials, width]);

  useEffect(() => {
    latest.current = { range, placeRing };
    placeRing();
  }, [range, placeRing]);
  useEffect(() => plot.current?.redraw(false), [range]);
  useThemeChange(() => plot.current?.redraw(false));

  const place = at === null ? -1 : (placeOf.get(at) ?? -1);
  const entry = place < 0 ? null : trials[place];
  const spoken = entry
    ? `trial ${entry.trial + 1}, fold ${entry.fold + 1}, true ${chartNumber(entry.label)}, held-out ${chartNumber(entry.predicted)}, residual ${chartNumber(entry.predicted - entry.label, 2, true)}`
    : '';
  const nearest = (clientX: number, clientY: number, box: DOMRect): void => {
    const u = plot.current;
    if (!u) return;
    const ratio = devicePixelRatio;
    const px = clientX - box.left - u.bbox.left / ratio;
    const py = clientY - box.top - u.bbox.top / ratio;
    let best = -1;
    let least = 24 ** 2;
    trials.forEach((candidate, index) => {
      const d =
        (u.valToPos(drawn.xs[index], 'x') - px) ** 2 + (u.valToPos(candidate.predicted, 'y') - py) ** 2;
      if (d < least) [best, least] = [index, d];
    });
    if (best >= 0) store.set({ at: trials[best].trial });
  };

  return (
    <div ref={holder}>
      <PlotCursor
        name={`Held-out against true ${label}, ${trials.length} trials`}
        place={place}
        count={trials.length}
        spoken={spoken}
        onMove={(next) => store.set({ at: next < 0 ? null : trials[next].trial })}
        onPointer={nearest}
      >
        <div className={styles.frame}>
          <div ref={target} />
          <div ref={ring} className={styles.ring} hidden />
        </div>
      </PlotCursor>
    </div>
  );
}
