'use client';
import { useEffect, useRef, useState, type RefObject } from 'react';

/**
 * Width in px of an element, kept up to date. Before the first measurement (and on the server) it is `initial`, so
 * that a drawing has its place before the script runs.
 */
export function useWidth<T extends HTMLElement>(initial: number): [RefObject<T | null>, number] {
  const ref = useRef<T>(null);
  const [width, setWidth] = useState(initial);
  useEffect(() => {
    const element = ref.current;
    if (!element) return;
    const measure = (): void => {
      const next = Math.floor(element.getBoundingClientRect().width);
      if (next > 0) setWidth(next);
    };
    measure();
    const observer = new ResizeObserver(measure);
    observer.observe(element);
    return () => observer.disconnect();
  }, []);
  return [ref, width];
}
