import { DateTime } from 'luxon';
import { DAY_MS, HOUR_MS, MINUTE_MS, type Interval } from './interval';
import { zoneName } from './zoneName';

export { isTimeZone, zoneName } from './zoneName';

const MONTHS = 'Jan Feb Mar Apr May Jun Jul Aug Sep Oct Nov Dec'.split(' ');
const WEEKDAYS = 'Mon Tue Wed Thu Fri Sat Sun'.split(' ');

/** Name of an ISO weekday, 1 Monday … 7 Sunday: "Mon". */
export function weekdayName(weekday: number): string {
  return WEEKDAYS[weekday - 1]!;
}

function inZone(atMs: number, timeZone: string): DateTime {
  return DateTime.fromMillis(atMs, { zone: timeZone });
}

function dayOf(at: DateTime, withYear: boolean): string {
  const day = `${WEEKDAYS[at.weekday - 1]} ${at.day} ${MONTHS[at.month - 1]}`;
  return withYear ? `${day} ${at.year}` : day;
}

function clockOf(at: DateTime): string {
  return at.toFormat('HH:mm');
}

/** "Wed 20 Jan", or "Wed 20 Jan 2027" with the year. UTC unless another zone is named. */
export function formatDay(
  atMs: number,
  { timeZone = 'UTC', withYear = false }: { timeZone?: string; withYear?: boolean } = {},
): string {
  return dayOf(inZone(atMs, timeZone), withYear);
}

/** "22:00". UTC unless another zone is named; say the zone beside it. */
export function formatClock(atMs: number, timeZone = 'UTC'): string {
  return clockOf(inZone(atMs, timeZone));
}

/** "Wed 20 Jan 22:00 UTC", or with the year "Wed 20 Jan 2027 22:00 UTC". */
export function formatUtc(atMs: number, { withYear = false }: { withYear?: boolean } = {}): string {
  const at = inZone(atMs, 'UTC');
  return `${dayOf(at, withYear)} ${clockOf(at)} UTC`;
}

/** "Wed 20 Jan 22:00–22:45 UTC"; over midnight "Wed 20 Jan 22:00 – Thu 21 Jan 00:30 UTC". */
export function formatUtcRange(
  range: Interval,
  { withYear = false }: { withYear?: boolean } = {},
): string {
  return `${rangeIn(range, 'UTC', withYear)} UTC`;
}

/**
 * Local time beside UTC: "CET 23:00"; where the local day is not the UTC day, with its weekday:
 * "CET Thu 00:30".
 */
export function formatLocal(atMs: number, timeZone: string): string {
  const local = inZone(atMs, timeZone);
  const utc = inZone(atMs, 'UTC');
  const weekday = local.weekday === utc.weekday ? '' : `${WEEKDAYS[local.weekday - 1]} `;
  return `${zoneName(atMs, timeZone)} ${weekday}${clockOf(local)}`;
}

/** Local range on its own, with day and zone: "Wed 20 Jan 23:00–23:45 CET". */
export function formatLocalRange(
  range: Interval,
  timeZone: string,
  { withYear = false }: { withYear?: boolean } = {},
): string {
  const startName = zoneName(range.startMs, timeZone);
  const endName = zoneName(range.endMs, timeZone);
  if (startName === endName) return `${rangeIn(range, timeZone, withYear)} ${endName}`;
  const start = inZone(range.startMs, timeZone);
  const end = inZone(range.endMs, timeZone);
  return `${dayOf(start, withYear)} ${clockOf(start)} ${startName} – ${dayOf(end, withYear)} ${clockOf(end)} ${endName}`;
}

function rangeIn(range: Interval, timeZone: string, withYear: boolean): string {
  const start = inZone(range.startMs, timeZone);
  const end = inZone(range.endMs, timeZone);
  if (start.year === end.year && start.ordinal === end.ordinal) {
    return `${dayOf(start, withYear)} ${clockOf(start)}–${clockOf(end)}`;
  }
  return `${dayOf(start, withYear)} ${clockOf(start)} – ${dayOf(end, withYear)} ${clockOf(end)}`;
}

/** "2 d 3 h", "1 h 05 min", "30 min". Rounded to whole minutes, from a day on to whole hours. */
export function formatDuration(durationMs: number): string {
  if (durationMs < 0) return `${MINUS}${formatDuration(-durationMs)}`;
  let minutes = Math.round(durationMs / MINUTE_MS);
  if (minutes * MINUTE_MS >= DAY_MS) {
    const hours = Math.round(durationMs / HOUR_MS);
    const days = Math.floor(hours / 24);
    return hours % 24 === 0 ? `${days} d` : `${days} d ${hours % 24} h`;
  }
  const hours = Math.floor(minutes / 60);
  minutes %= 60;
  if (hours === 0) return `${minutes} min`;
  return minutes === 0 ? `${hours} h` : `${hours} h ${String(minutes).padStart(2, '0')} min`;
}

/** "7:40" for tables: hours and minutes; hours may pass 24. */
export function formatHoursMinutes(durationMs: number): string {
  const minutes = Math.round(durationMs / MINUTE_MS);
  return `${Math.floor(minutes / 60)}:${String(minutes % 60).padStart(2, '0')}`;
}

const MINUS = '\u2212';
const NO_BREAK_SPACE = '\u00a0';

/**
 * A figure for people: fixed decimals, minus as U+2212, thousands parted by a no-break space
 * ("373 587", "−12.3"). Never "−0". Not a finite number: "–".
 */
export function formatNumber(value: number, decimals = 0): string {
  if (!Number.isFinite(value)) return '–';
  const [whole, fraction] = Math.abs(value).toFixed(decimals).split('.') as [string, string?];
  const grouped = whole.replace(/\B(?=(\d{3})+(?!\d))/g, NO_BREAK_SPACE);
  const figure = fraction === undefined ? grouped : `${grouped}.${fraction}`;
  return value < 0 && /[1-9]/.test(figure) ? `${MINUS}${figure}` : figure;
}

/** As `formatNumber`, with "+" before what is over zero: "+6.1", "−0.4", "0.0". */
export function formatSigned(value: number, decimals = 1): string {
  const figure = formatNumber(value, decimals);
  return value > 0 && /[1-9]/.test(figure) ? `+${figure}` : figure;
}

/** "47.7°" */
export function formatAngle(angleDeg: number, decimals = 1): string {
  return `${formatNumber(angleDeg, decimals)}°`;
}

/** Doppler with its sign: to 1 Hz below 1.3 GHz ("−540 Hz"), to 10 Hz from there on ("+2 710 Hz"). */
export function formatDoppler(dopplerHz: number, frequencyMhz: number): string {
  const stepHz = frequencyMhz < 1300 ? 1 : 10;
  return `${formatSigned(Math.round(dopplerHz / stepHz) * stepHz, 0)}${NO_BREAK_SPACE}Hz`;
}

/** "57.19° N, 18.38° E" */
export function formatPosition(
  { latitudeDeg, longitudeDeg }: { latitudeDeg: number; longitudeDeg: number },
  decimals = 2,
): string {
  const latitude = `${formatNumber(Math.abs(latitudeDeg), decimals)}° ${latitudeDeg < 0 ? 'S' : 'N'}`;
  const longitude = `${formatNumber(Math.abs(longitudeDeg), decimals)}° ${longitudeDeg < 0 ? 'W' : 'E'}`;
  return `${latitude}, ${longitude}`;
}
