import { DateTime } from 'luxon';
import { HOUR_MS } from '../time/interval';
import type { MailPreference } from './mailPreference';

/** A digest that could not go out for longer than this waits for its next turn. */
const LATEST_MS = 12 * HOUR_MS;

/**
 * The newest turn of the digest that has come: the chosen hour on a day of the person's zone, in a week of that zone on
 * the chosen day. An hour that the clocks skip comes when they have been put forward; one that they repeat comes once.
 */
export function digestTurn(
  nowMs: number,
  timeZone: string,
  { rhythm, hour, weekday }: MailPreference['digest'],
): number {
  const now = DateTime.fromMillis(nowMs, { zone: timeZone });
  const backToDay = rhythm === 'weekly' ? (now.weekday - weekday + 7) % 7 : 0;
  const step = rhythm === 'weekly' ? 7 : 1;
  for (const daysBack of [backToDay, backToDay + step]) {
    const { year, month, day } = now.minus({ days: daysBack });
    const turnMs = DateTime.fromObject({ year, month, day, hour }, { zone: timeZone }).toMillis();
    if (turnMs <= nowMs) return turnMs;
  }
  throw new Error(`No hour ${hour} found before ${nowMs} in ${timeZone}.`);
}

export interface DigestState {
  /** When the person was last looked at, whether or not a mail was needed; null for never. */
  lastMs: number | null;
  /** Since when the present wish holds; a turn before it does not count. */
  sinceMs: number;
}

/** Whether the digest of a person is due: its turn has come, and none of that local day was looked at before. */
export function digestIsDue(
  nowMs: number,
  timeZone: string,
  digest: MailPreference['digest'],
  { lastMs, sinceMs }: DigestState,
): boolean {
  const turnMs = digestTurn(nowMs, timeZone, digest);
  if (turnMs < sinceMs || nowMs - turnMs > LATEST_MS) return false;
  if (lastMs === null) return true;
  if (lastMs >= turnMs) return false;
  const dayOf = (atMs: number) => DateTime.fromMillis(atMs, { zone: timeZone }).toISODate()!;
  return dayOf(lastMs) < dayOf(turnMs);
}
