const FIRST_MS = 15_000;
const LONGEST_MS = 3_600_000;

/**
 * How long to wait after the n-th failed attempt (n from 1): 15 s, doubled each time, at most one hour,
 * of which a random part between half and the whole is taken so that a returning mail server is not
 * met by everything at once. `random` is in [0, 1).
 */
export function backoffMs(attempts: number, random: number): number {
  const whole = Math.min(LONGEST_MS, FIRST_MS * 2 ** Math.min(attempts - 1, 20));
  return Math.round(whole * (0.5 + random / 2));
}
