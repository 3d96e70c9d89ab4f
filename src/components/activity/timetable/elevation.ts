import {
  MOON_STEP_MINUTES,
  type TimetableStation,
  type TimetableView,
} from '../../../domain/activity/timetableView';
import { MINUTE_MS } from '../../../domain/time/interval';

/** The Moon's elevation at the station, between the instants that the view has, in degrees. */
export function elevationAt(
  { startMs }: Pick<TimetableView, 'startMs'>,
  { moonElevationDeg }: Pick<TimetableStation, 'moonElevationDeg'>,
  atMs: number,
): number {
  const step = (atMs - startMs) / (MOON_STEP_MINUTES * MINUTE_MS);
  const index = Math.min(Math.max(Math.floor(step), 0), moonElevationDeg.length - 1);
  const here = moonElevationDeg[index] ?? 0;
  const there = moonElevationDeg[index + 1] ?? here;
  return here + (there - here) * Math.min(1, Math.max(0, step - index));
}
