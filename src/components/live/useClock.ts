import { useEffect, useState } from 'react';

/** The device's clock, anew at each full second. `startMs`: what to show until the first tick. */
export function useClock(startMs: number, now: () => number = Date.now): number {
  const [atMs, setAtMs] = useState(startMs);
  useEffect(() => {
    let timer: ReturnType<typeof setTimeout>;
    const tick = () => {
      const nowMs = now();
      setAtMs(nowMs);
      timer = setTimeout(tick, 1000 - (nowMs % 1000));
    };
    // A phone that slept shows the right second at once.
    const wake = () => {
      clearTimeout(timer);
      tick();
    };
    tick();
    document.addEventListener('visibilitychange', wake);
    return () => {
      clearTimeout(timer);
      document.removeEventListener('visibilitychange', wake);
    };
  }, [now]);
  return atMs;
}
