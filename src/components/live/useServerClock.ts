import { useEffect, useState } from 'react';
import { paths } from '../../paths';

/** How far this device's clock is ahead of the server's, and how well that is known. */
export interface ClockDifference {
  aheadMs: number;
  uncertaintyMs: number;
}

const TRIES = 3;

/** Measured once when the view opens; null until then, and where the server does not answer. */
export function useServerClock(): ClockDifference | null {
  const [difference, setDifference] = useState<ClockDifference | null>(null);
  useEffect(() => {
    const given = new AbortController();
    measure(given.signal).then(setDifference, () => undefined);
    return () => given.abort();
  }, []);
  return difference;
}

/** The quickest answer of three tells best. */
async function measure(signal: AbortSignal): Promise<ClockDifference> {
  let best: ClockDifference | null = null;
  for (let tries = 0; tries < TRIES; tries += 1) {
    const askedMs = Date.now();
    const answer = await fetch(paths.api.clock, { signal, cache: 'no-store' });
    const { now } = (await answer.json()) as { now: string };
    const answeredMs = Date.now();
    const uncertaintyMs = (answeredMs - askedMs) / 2;
    const aheadMs = (askedMs + answeredMs) / 2 - Date.parse(now);
    if (!best || uncertaintyMs < best.uncertaintyMs) best = { aheadMs, uncertaintyMs };
  }
  return best!;
}
