import type { Interval } from '../time/interval';
import type { WindowLayers } from '../window/layers';
import type { TakenSlot } from '../window/searchData';

/** Some weeks of common windows, ready to be drawn: nothing in it tells where the stations are. */
export interface RasterMonth {
  fromMs: number;
  days: number;
  nowMs: number;
  stations: { callSign: string; timeZone: string | null; usable?: Interval[] | undefined }[];
  layers: Pick<
    WindowLayers,
    'windows' | 'windowQuality' | 'bands' | 'outside' | 'hidden' | 'days' | 'phases'
  >;
  taken: TakenSlot[];
}

/**
 * The start of a slot of that length in a window, on a full five minutes: where it was pressed, else around the best
 * moment, held inside the window and after now.
 */
export function startInWindow(
  window: Interval & { best?: { timeMs: number } | undefined },
  lengthMs: number,
  atMs: number | null,
  nowMs: number,
): number {
  const step = 300_000;
  const wishedMs = atMs ?? (window.best?.timeMs ?? window.startMs + lengthMs / 2) - lengthMs / 2;
  const earliestMs = Math.ceil(Math.max(window.startMs, nowMs + step) / step) * step;
  const latestMs = Math.floor((window.endMs - lengthMs) / step) * step;
  return Math.max(earliestMs, Math.min(latestMs, Math.round(wishedMs / step) * step));
}
