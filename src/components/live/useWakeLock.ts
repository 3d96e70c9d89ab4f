import { useCallback, useEffect, useState } from 'react';

export type WakeState = 'on' | 'off' | 'cannot';

/** Keeps the screen awake while the page is in view, where the browser can. */
export function useWakeLock(): { state: WakeState; toggle: () => void } {
  const [state, setState] = useState<WakeState>('off');
  const [wanted, setWanted] = useState(true);
  const [held, setHeld] = useState<WakeLockSentinel | null>(null);

  const request = useCallback(async () => {
    if (!('wakeLock' in navigator)) {
      setState('cannot');
      return;
    }
    try {
      const lock = await navigator.wakeLock.request('screen');
      lock.addEventListener('release', () => setState('off'));
      setHeld(lock);
      setState('on');
    } catch {
      // Low battery, or the page is not in view: the state says so and the button tries again.
      setState('off');
    }
  }, []);

  useEffect(() => {
    if (!wanted) return;
    void request();
    const again = () => {
      if (document.visibilityState === 'visible') void request();
    };
    document.addEventListener('visibilitychange', again);
    return () => document.removeEventListener('visibilitychange', again);
  }, [wanted, request]);

  const toggle = () => {
    if (state === 'on') {
      setWanted(false);
      void held?.release();
    } else if (wanted) {
      void request();
    } else {
      setWanted(true);
    }
  };
  return { state, toggle };
}
