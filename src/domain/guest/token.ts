import { isLocator, normalizeLocator } from '../locator/locator';
import { callSignProblem } from '../station/callSign';
import { isTimeZone } from '../time/format';
import type { GuestPlace } from './guest';

/**
 * A guest as it stands in an address: "QZ9NEW~JO40aa@Europe/Berlin~e5-90~a90-270~h08:00-23:00~d3~p250". All after the
 * locator may be missing.
 */
export function guestToken(place: GuestPlace): string {
  const { elevationFromDeg, elevationToDeg, azimuthFromDeg, azimuthToDeg, hours, dish } = place;
  const parts = [
    place.callSign,
    place.timeZone === undefined ? place.locator : `${place.locator}@${place.timeZone}`,
  ];
  if (elevationFromDeg !== undefined || elevationToDeg !== undefined) {
    parts.push(`e${elevationFromDeg ?? ''}-${elevationToDeg ?? ''}`);
  }
  if (azimuthFromDeg !== undefined && azimuthToDeg !== undefined) {
    parts.push(`a${azimuthFromDeg}-${azimuthToDeg}`);
  }
  if (hours) parts.push(`h${hours.from}-${hours.to}`);
  if (dish) parts.push(`d${dish.diameterM}`, `p${dish.powerAtFeedW}`);
  return parts.join('~');
}

/** Whether the text means a guest, whatever is wrong with it. */
export function isGuestToken(text: string): boolean {
  return text.includes('~');
}

/** The guest behind a token, or a sentence about what is wrong with it. */
export function readGuestToken(text: string): GuestPlace | string {
  const [callSign = '', where = '', ...limits] = text.split('~');
  const place: GuestPlace = { callSign: callSign.trim().toUpperCase(), locator: '' };
  const wrongCallSign = callSignProblem(place.callSign);
  if (wrongCallSign) return wrongCallSign;
  const [locator = '', zone] = where.split('@', 2);
  if (!isLocator(locator)) {
    return `“${locator.slice(0, 20)}” is not a locator such as JO97ee, so ${place.callSign} has no place.`;
  }
  place.locator = normalizeLocator(locator);
  if (zone !== undefined) {
    if (!isTimeZone(zone)) {
      return `“${zone.slice(0, 40)}” is not a time zone such as Europe/Stockholm.`;
    }
    place.timeZone = zone;
  }
  let diameterM: number | undefined;
  let powerAtFeedW: number | undefined;
  for (const limit of limits) {
    const unread = `“${limit.slice(0, 20)}” of ${place.callSign} could not be read.`;
    const value = limit.slice(1);
    const range = /^(\d{1,3}(?:\.\d{1,2})?)?-(\d{1,3}(?:\.\d{1,2})?)?$/.exec(value);
    const from = range?.[1] === undefined ? undefined : Number(range[1]);
    const to = range?.[2] === undefined ? undefined : Number(range[2]);
    const clock = /^((?:[01]\d|2[0-3]):[0-5]\d)-((?:[01]\d|2[0-3]):[0-5]\d|24:00)$/.exec(value);
    const size = /^\d{1,6}(?:\.\d{1,3})?$/.test(value) ? Number(value) : NaN;
    switch (limit[0]) {
      case 'e':
        if (!range || (from ?? 0) >= (to ?? 90) || (to ?? 90) > 90) return unread;
        place.elevationFromDeg = from;
        place.elevationToDeg = to;
        break;
      case 'a':
        if (from === undefined || to === undefined || from > 360 || to > 360 || noWidth(from, to)) {
          return unread;
        }
        place.azimuthFromDeg = from;
        place.azimuthToDeg = to;
        break;
      case 'h':
        if (!clock) return unread;
        place.hours = { from: clock[1]!, to: clock[2]! };
        break;
      case 'd':
        if (!(size >= 0.1 && size <= 100)) return unread;
        diameterM = size;
        break;
      case 'p':
        if (!(size > 0 && size <= 10_000)) return unread;
        powerAtFeedW = size;
        break;
      default:
        return unread;
    }
  }
  if (diameterM !== undefined && powerAtFeedW !== undefined) {
    place.dish = { diameterM, powerAtFeedW };
  }
  return place;
}

function noWidth(fromDeg: number, toDeg: number): boolean {
  return fromDeg % 360 === toDeg % 360 && !(fromDeg === 0 && toDeg === 360);
}
