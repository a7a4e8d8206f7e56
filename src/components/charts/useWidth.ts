import { useEffect, useRef, useState, type RefObject } from 'react';

/**
 * The real width of an element in CSS pixels, so that a chart can be laid out at 1:1 and its words never scale.
 * Before the first measurement (and on the server) it is `fallback`.
 */
export function useWidth<T extends HTMLElement>(fallback = 600): [RefObject<T | null>, number] {
  const ref = useRef<T>(null);
  const [width, setWidth] = useState(fallback);
  useEffect(() => {
    const element = ref.current;
    if (!element) return;
    const observer = new ResizeObserver(([entry]) => {
      const next = Math.round(entry?.contentRect.width ?? 0);
      if (next > 0) setWidth(next);
    });
    observer.observe(element);
    return () => observer.disconnect();
  }, []);
  return [ref, width];
}
