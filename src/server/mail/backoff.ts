/** How the waits between attempts grow. */
export interface Backoff {
  firstMs: number;
  longestMs: number;
}

/** The longest wait after the n-th failed attempt (n from 1): `firstMs`, doubled each time, at most `longestMs`. */
export function longestWaitMs(attempts: number, { firstMs, longestMs }: Backoff): number {
  return Math.min(longestMs, firstMs * 2 ** Math.min(attempts - 1, MOST_DOUBLINGS));
}

export const MOST_DOUBLINGS = 20;

/**
 * How long to wait after the n-th failed attempt: of the longest wait a random part between half and the whole
 * is taken, so that a returning mail server is not met by everything at once. `random` is in [0, 1).
 */
export function backoffMs(attempts: number, random: number, backoff: Backoff): number {
  return Math.round(longestWaitMs(attempts, backoff) * (0.5 + random / 2));
}
