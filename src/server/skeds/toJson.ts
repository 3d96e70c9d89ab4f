import type { SkedSummary, SkedView } from '../../domain/sked/view';
import type { TalkMessage } from '../../domain/sked/talk';
import type { Interval } from '../../domain/time/interval';

/** What the API answers about a sked: instants as ISO 8601 in UTC. */
export function summaryToJson({ startMs, endMs, ...sked }: SkedSummary) {
  return { ...sked, ...slotToJson({ startMs, endMs }) };
}

export function skedToJson({ events, reports, ...sked }: SkedView) {
  const { choices, ...summary } = sked;
  return {
    ...summaryToJson(summary),
    choices,
    events: events.map(({ startMs, endMs, atMs, ...event }) => ({
      ...event,
      ...slotToJson({ startMs, endMs }),
      at: iso(atMs),
    })),
    reports: reports.map(({ atMs, ...report }) => ({ ...report, at: iso(atMs) })),
  };
}

export function messageToJson({ atMs, ...message }: TalkMessage) {
  return { ...message, at: iso(atMs) };
}

function slotToJson({ startMs, endMs }: Interval) {
  return { start: iso(startMs), end: iso(endMs) };
}

function iso(atMs: number): string {
  return new Date(atMs).toISOString();
}
