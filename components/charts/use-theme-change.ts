'use client';
import { useEffect, useRef } from 'react';

/** Calls `redraw` when the page's colours change: the theme switch, the system's wish, or the way to the printer. */
export function useThemeChange(redraw: () => void): void {
  const latest = useRef(redraw);
  useEffect(() => {
    latest.current = redraw;
  });
  useEffect(() => {
    const call = (): void => latest.current();
    const attribute = new MutationObserver(call);
    attribute.observe(document.documentElement, { attributes: true, attributeFilter: ['data-theme'] });
    const dark = matchMedia('(prefers-color-scheme: dark)');
    const print = matchMedia('print');
    dark.addEventListener('change', call);
    print.addEventListener('change', call);
    return () => {
      attribute.disconnect();
      dark.removeEventListener('change', call);
      print.removeEventListener('change', call);
    };
  }, []);
}
