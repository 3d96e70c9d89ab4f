import type { Weekend } from '../../domain/outlook/weekends';
import type { OutlookDay } from '../../domain/outlook/year';
import { qualityOfDegradation, type QualityStep } from '../../domain/window/quality';

/** Sizes of one ribbon in its own units. */
export interface RibbonFrame {
  width: number;
  /** Room for names left of the strips; 0 puts them above. */
  gutter: number;
  stripHeight: number;
  /** Upper end of the hours, the same for ribbons that are compared. */
  mostHours: number;
}

export interface Strip {
  name: string;
  top: number;
  height: number;
  line: string;
  /** Figures at the upper and lower edge. */
  upper: string;
  lower: string;
  /** Where zero lies, if inside. */
  zero: number | null;
}

export interface Ribbon {
  height: number;
  strips: Strip[];
  rampTop: number;
  /** Stretches of days of one step of quality. */
  ramp: { x: number; width: number; step: QualityStep }[];
  sun: { x: number; width: number }[];
  months: { x: number; name: string }[];
  marks: { x: number; width: number; rank: number }[];
  axisY: number;
}

const MONTHS = 'Jan Feb Mar Apr May Jun Jul Aug Sep Oct Nov Dec'.split(' ');
const NEAREST_KM = 355_000;
const FARTHEST_KM = 408_000;
const SUN_CLOSE_DEG = 15;
const HEAD = 24;
const RAMP = 14;
const SUN = 4;
/** Least width of a month that still carries its name. */
const LEAST_MONTH = 26;

/** Everything the picture of some days in a row draws. Near is up, north is up. */
export function ribbonOf(
  days: readonly OutlookDay[],
  best: readonly Weekend[],
  frame: RibbonFrame,
): Ribbon {
  const { width, gutter, stripHeight, mostHours } = frame;
  const step = (width - gutter) / days.length;
  const x = (day: number) => round(gutter + day * step);
  const named = gutter === 0 ? 20 : 16;
  const rampTop = HEAD + (gutter === 0 ? 16 : 0);
  let top = rampTop + RAMP + SUN + 4 + named;
  const strip = (
    name: string,
    values: readonly number[],
    [atBottom, atTop]: [number, number],
    [upper, lower]: [string, string],
  ): Strip => {
    const y = (value: number) =>
      round(top + stripHeight * (1 - (value - atBottom) / (atTop - atBottom)));
    const points = values.map((value, day) => `${round(x(day) + step / 2)} ${y(value)}`);
    const zero = atBottom < 0 && atTop > 0 ? y(0) : null;
    const made = {
      name,
      top,
      height: stripHeight,
      line: `M${points.join('L')}`,
      upper,
      lower,
      zero,
    };
    top += stripHeight + named + 4;
    return made;
  };
  const strips = [
    strip(
      'Distance, 1000 km',
      days.map(({ distanceKm }) => distanceKm),
      [FARTHEST_KM, NEAREST_KM],
      ['355', '408'],
    ),
    strip(
      'Declination',
      days.map(({ declinationDeg }) => declinationDeg),
      [-30, 30],
      ['30° N', '30° S'],
    ),
    strip(
      'Common hours a day',
      days.map(({ commonHours }) => commonHours),
      [0, mostHours],
      [`${mostHours} h`, '0'],
    ),
  ];
  const axisY = top - named + 8;
  return {
    height: axisY + 20,
    strips,
    rampTop,
    ramp: runs(days, ({ degradationDb }) => qualityOfDegradation(degradationDb).step).map(
      ({ from, to, value }) => ({ x: x(from), width: round((to - from) * step), step: value }),
    ),
    sun: runs(days, ({ sunSeparationDeg }) => sunSeparationDeg < SUN_CLOSE_DEG)
      .filter(({ value }) => value)
      .map(({ from, to }) => ({ x: x(from), width: round((to - from) * step) })),
    months: runs(days, ({ startMs }) => new Date(startMs).getUTCMonth()).map(
      ({ from, to, value }) => ({
        x: x(from),
        name: (to - from) * step < LEAST_MONTH ? '' : monthName(days[from]!, value),
      }),
    ),
    marks: best.flatMap((weekend, index) => {
      const day = days.indexOf(weekend.saturday);
      return day < 0 ? [] : [{ x: x(day), width: round(2 * step), rank: index + 1 }];
    }),
    axisY,
  };
}

function monthName({ startMs }: OutlookDay, month: number): string {
  return month === 0 ? `Jan ${new Date(startMs).getUTCFullYear()}` : MONTHS[month]!;
}

/** 6, 12, 18 or 24: the least that holds every day. */
export function hoursTop(days: readonly OutlookDay[]): number {
  const most = Math.max(...days.map(({ commonHours }) => commonHours));
  return Math.max(6, Math.ceil(most / 6) * 6);
}

function runs<T>(
  days: readonly OutlookDay[],
  valueOf: (day: OutlookDay) => T,
): { from: number; to: number; value: T }[] {
  const found: { from: number; to: number; value: T }[] = [];
  days.forEach((day, index) => {
    const value = valueOf(day);
    const last = found.at(-1);
    if (last && last.value === value) last.to = index + 1;
    else found.push({ from: index, to: index + 1, value });
  });
  return found;
}

function round(value: number): number {
  return Math.round(value * 10) / 10;
}
