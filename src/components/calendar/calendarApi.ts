import type { CalendarData } from '../../domain/sked/calendarView';
import type { SkedSummary } from '../../domain/sked/view';
import type { Interval } from '../../domain/time/interval';
import { paths } from '../../paths';

interface WireSlot {
  start: string;
  end: string;
}

/** What the server refused, with the other slots it offers. */
export class Refused extends Error {
  constructor(
    message: string,
    readonly alternatives: Interval[],
  ) {
    super(message);
  }
}

function slotOf({ start, end }: WireSlot): Interval {
  return { startMs: Date.parse(start), endMs: Date.parse(end) };
}

async function call<T>(url: string, init?: RequestInit): Promise<T> {
  let response: Response;
  try {
    response = await fetch(url, { ...init, headers: { 'content-type': 'application/json' } });
  } catch {
    throw new Refused('The server could not be reached. Nothing was changed.', []);
  }
  const body = (await response.json()) as T & {
    error?: { message: string; alternatives?: WireSlot[] };
  };
  if (response.ok) return body;
  throw new Refused(
    body.error?.message ?? 'Something broke. Nothing was changed.',
    (body.error?.alternatives ?? []).map(slotOf),
  );
}

export async function fetchCalendar(span: Interval, ground: string): Promise<CalendarData> {
  const query = new URLSearchParams({
    from: new Date(span.startMs).toISOString(),
    to: new Date(span.endMs).toISOString(),
    ...(ground ? { ground } : {}),
  });
  const wire = await call<{
    skeds: (Omit<SkedSummary, keyof Interval> & WireSlot)[];
    ground: WireSlot[];
  }>(`${paths.api.calendar}?${query.toString()}`);
  return {
    skeds: wire.skeds.map(({ start, end, ...sked }) => ({ ...sked, ...slotOf({ start, end }) })),
    ground: wire.ground.map(slotOf),
  };
}

/** Offers another time for the sked. Throws `Refused`. */
export async function moveSked(sked: SkedSummary, slot: Interval, words: string) {
  return call<{ version: number; warnings: string[] }>(paths.api.skedMove(sked.id), {
    method: 'POST',
    body: JSON.stringify({
      version: sked.version,
      start: new Date(slot.startMs).toISOString(),
      end: new Date(slot.endMs).toISOString(),
      words,
    }),
  });
}
