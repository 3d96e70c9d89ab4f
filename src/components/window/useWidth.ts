import { useCallback, useState, type RefCallback } from 'react';

/** Width of an element in whole pixels, 0 until it is known; the element may come later and go again. */
export function useWidth<T extends HTMLElement>(): [RefCallback<T>, number] {
  const [width, setWidth] = useState(0);
  const attach = useCallback((target: T | null) => {
    if (!target) return;
    setWidth(Math.floor(target.getBoundingClientRect().width));
    const observer = new ResizeObserver(([entry]) => {
      if (entry) setWidth(Math.floor(entry.contentRect.width));
    });
    observer.observe(target);
    return () => observer.disconnect();
  }, []);
  return [attach, width];
}
