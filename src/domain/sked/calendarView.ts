import type { Interval } from '../time/interval';
import type { SkedSummary } from './view';

/** What lies behind the skeds of a calendar: the Moon over one station, or common windows with partners. */
export interface CalendarGround {
  /** "moon:ID", or "pair:ID:ID" with the viewer's station first. */
  key: string;
  label: string;
}

export interface CalendarData {
  skeds: SkedSummary[];
  ground: Interval[];
}

/** Whether the viewer can move this sked by dragging. */
export function canBeMoved(sked: SkedSummary, nowMs: number): boolean {
  return (sked.state === 'offered' || sked.state === 'agreed') && sked.startMs > nowMs;
}
