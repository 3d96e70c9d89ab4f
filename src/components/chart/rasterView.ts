import { DateTime } from 'luxon';
import { formatClock, zoneName } from '../../domain/time/format';
import { DAY_MS, HOUR_MS, type Interval } from '../../domain/time/interval';
import type { WindowLayers } from '../../domain/window/layers';

/** What a raster draws of an answer. */
export type RasterLayers = Pick<
  WindowLayers,
  'windows' | 'windowQuality' | 'bands' | 'outside' | 'hidden' | 'days' | 'phases'
>;

export interface RasterStation {
  callSign: string;
  timeZone: string | null;
  /** Absent: always usable. */
  usable?: Interval[] | undefined;
}

export interface RasterAxis {
  /** "QA1LUN CET" */
  label: string;
  /** One label for each second hour, 0 … 24 UTC. */
  hours: string[];
}

/** The UTC axis and the clocks of the first two stations whose zone is known, as they stand on the first day. */
export function rasterAxes(stations: readonly RasterStation[], fromMs: number): RasterAxis[] {
  const hours = Array.from({ length: 13 }, (_, index) => index * 2);
  const axes: RasterAxis[] = [
    { label: 'UTC', hours: hours.map((hour) => String(hour).padStart(2, '0')) },
  ];
  for (const { callSign, timeZone } of stations.slice(0, 2)) {
    if (timeZone === null) continue;
    const clocks = hours.map((hour) => formatClock(fromMs + hour * HOUR_MS, timeZone));
    const whole = clocks.every((clock) => clock.endsWith(':00'));
    axes.push({
      label: `${callSign} ${zoneName(fromMs, timeZone)}`,
      hours: whole ? clocks.map((clock) => clock.slice(0, 2)) : clocks,
    });
  }
  return axes;
}

/** What the axes cannot say: changes of clocks within the days, and clocks without an axis. */
export function axisNotes(
  stations: readonly RasterStation[],
  fromMs: number,
  days: number,
): string[] {
  const notes: string[] = [];
  stations.slice(0, 2).forEach(({ callSign, timeZone }) => {
    if (timeZone === null) return;
    const offset = (day: number) =>
      DateTime.fromMillis(fromMs + day * DAY_MS, { zone: timeZone }).offset;
    for (let day = 1; day <= days; day += 1) {
      const change = offset(day) - offset(day - 1);
      if (change === 0) continue;
      const date = DateTime.fromMillis(fromMs + (day - 1) * DAY_MS + DAY_MS / 2, {
        zone: timeZone,
      });
      const way = change > 0 ? 'forward' : 'back';
      notes.push(
        `${callSign}’s clock goes ${way} ${Math.abs(change) === 60 ? 'an hour' : `${Math.abs(change)} minutes`} on ${date.day} ${date.toFormat('LLL')}; its axis is true before that.`,
      );
      break;
    }
  });
  const without = stations.slice(2).filter((station) => station.timeZone !== null);
  if (without.length > 0) {
    notes.push(
      `Clocks of the first two stations; those of ${without.map((station) => station.callSign).join(', ')} stand beside each window.`,
    );
  }
  return notes;
}
