import { SPEED_OF_LIGHT_MPS } from '../ephemeris/constants';

/**
 * Shift of a signal sent at one range rate and received at another, Hz; a receding Moon (rates positive) lowers
 * the frequency, so the shift is negative. Linear in frequency; the exact product
 * f·[c/(c+v1)]·[c/(c+v2)] (read in the source: Katz, "Understanding Doppler shift") differs by under 0.4 Hz at
 * 47 GHz. Own echo: leave the second rate out.
 */
export function dopplerHz(
  frequencyMhz: number,
  rangeRateMps: number,
  otherRangeRateMps = rangeRateMps,
): number {
  return (-frequencyMhz * 1e6 * (rangeRateMps + otherRangeRateMps)) / SPEED_OF_LIGHT_MPS;
}

/** How the two stations share the correction of Doppler. */
export const DIAL_CONVENTIONS = [
  'none',
  'constantAtMoon',
  'firstCorrectsAll',
  'secondCorrectsAll',
  'receiveOnly',
  'ownEchoOnFrequency',
] as const;

export type DialConvention = (typeof DIAL_CONVENTIONS)[number];

/** What to add to the agreed frequency F on a station's dial, Hz. */
export interface DialShift {
  transmitHz: number;
  receiveHz: number;
}

/**
 * Dial shifts of both stations from their own-echo shifts, for each convention (published practice; the
 * arithmetic follows the 432 MHz newsletter's example of March 2000, read in the source):
 * - `none`: both transmit on F and find the partner at F + (D1 + D2)/2 by tuning; the dial stays on F.
 * - `constantAtMoon`: each transmits F − D/2 with its own D, so that both arrive at the Moon on F, and listens at
 *   F + D/2.
 * - `firstCorrectsAll`, `secondCorrectsAll`: that station transmits F − (D1 + D2)/2 and listens at
 *   F + (D1 + D2)/2; the other stays on F for both.
 * - `receiveOnly`: both transmit on F and listen at F + (D1 + D2)/2.
 * - `ownEchoOnFrequency`: each transmits F − D so that its own echo comes back on F, and hears the partner, who
 *   does the same, at F + (D1 − D2)/2 with D1 its own.
 */
export function dialShifts(
  firstOwnEchoHz: number,
  secondOwnEchoHz: number,
): Record<DialConvention, { first: DialShift; second: DialShift }> {
  const mutualHz = (firstOwnEchoHz + secondOwnEchoHz) / 2;
  const still = { transmitHz: 0, receiveHz: 0 };
  const correctsAll = { transmitHz: -mutualHz, receiveHz: mutualHz };
  const listens = { transmitHz: 0, receiveHz: mutualHz };
  const atMoon = (ownHz: number) => ({ transmitHz: -ownHz / 2, receiveHz: ownHz / 2 });
  const ownEcho = (ownHz: number, partnerHz: number) => ({
    transmitHz: -ownHz,
    receiveHz: (ownHz - partnerHz) / 2,
  });
  return {
    none: { first: { ...still }, second: { ...still } },
    constantAtMoon: { first: atMoon(firstOwnEchoHz), second: atMoon(secondOwnEchoHz) },
    firstCorrectsAll: { first: correctsAll, second: { ...still } },
    secondCorrectsAll: { first: { ...still }, second: { ...correctsAll } },
    receiveOnly: { first: listens, second: { ...listens } },
    ownEchoOnFrequency: {
      first: ownEcho(firstOwnEchoHz, secondOwnEchoHz),
      second: ownEcho(secondOwnEchoHz, firstOwnEchoHz),
    },
  };
}
