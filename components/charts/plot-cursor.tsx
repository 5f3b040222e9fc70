'use client';
import type { KeyboardEvent, ReactNode } from 'react';
import styles from '@/components/charts/figure.module.css';

/**
 * Makes a drawing a thing that the keyboard can walk: one tab stop with the role of a slider, so that a screen reader
 * speaks `spoken` whenever the place changes. Left/Right step, PageUp/PageDown leap, Home/End go to the ends, Esc lets
 * go.
 */
export function PlotCursor({
  name,
  place,
  count,
  spoken,
  leap = 10,
  onMove,
  onKey,
  onPointer,
  children,
}: {
  name: string;
  /** Place of the cursor, −1 for none. */
  place: number;
  count: number;
  spoken: string;
  leap?: number;
  onMove: (place: number) => void;
  onKey?: (event: KeyboardEvent<HTMLDivElement>) => boolean;
  onPointer?: (x: number, y: number, box: DOMRect) => void;
  children: ReactNode;
}) {
  const onKeyDown = (event: KeyboardEvent<HTMLDivElement>): void => {
    if (event.ctrlKey || event.metaKey || event.altKey) return;
    if (onKey?.(event)) {
      event.preventDefault();
      return;
    }
    if (event.key === 'Escape') {
      onMove(-1);
      return;
    }
    const to: Record<string, number> = {
      ArrowLeft: place - 1,
      ArrowDown: place - 1,
      ArrowRight: place + 1,
      ArrowUp: place + 1,
      PageUp: place - leap,
      PageDown: place + leap,
      Home: 0,
      End: count - 1,
    };
    if (!(event.key in to) || count === 0) return;
    event.preventDefault();
    onMove(Math.max(0, Math.min(count - 1, to[event.key])));
  };
  return (
    <div
      className={styles.cursorArea}
      role="slider"
      tabIndex={0}
      aria-label={name}
      aria-orientation="horizontal"
      aria-valuemin={0}
      aria-valuemax={Math.max(0, count - 1)}
      aria-valuenow={Math.max(0, place)}
      aria-valuetext={place < 0 ? 'no place chosen' : spoken}
      onKeyDown={onKeyDown}
      onPointerMove={
        onPointer &&
        ((event) => onPointer(event.clientX, event.clientY, event.currentTarget.getBoundingClientRect()))
      }
    >
      {children}
    </div>
  );
}
