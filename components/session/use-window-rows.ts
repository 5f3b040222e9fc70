'use client';
import { useCallback, useState, type UIEvent } from 'react';

/**
 * Which rows of a long table stand in a scrolling region, with a few beyond its edges. Short tables are whole.
 * `before` and `after` are the px that the other rows would take.
 */
export function useWindowRows(
  count: number,
  rowPx: number,
  viewPx: number,
): {
  from: number;
  to: number;
  before: number;
  after: number;
  onScroll: (event: UIEvent<HTMLElement>) => void;
} {
  const [top, setTop] = useState(0);
  const onScroll = useCallback(
    (event: UIEvent<HTMLElement>) => {
      // Whole steps of eight rows: fewer renders than scroll events.
      const step = 8 * rowPx;
      setTop(Math.floor(event.currentTarget.scrollTop / step) * step);
    },
    [rowPx],
  );
  const whole = count * rowPx <= 2 * viewPx;
  const from = whole ? 0 : Math.max(0, Math.min(count, Math.floor(top / rowPx) - 8));
  const to = whole ? count : Math.min(count, Math.ceil((top + viewPx) / rowPx) + 16);
  return { from, to, before: from * rowPx, after: (count - to) * rowPx, onScroll };
}
