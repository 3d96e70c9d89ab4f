import { z } from 'zod';
import type { CalendarData } from '../../domain/sked/calendarView';
import { DAY_MS } from '../../domain/time/interval';
import type { Viewer } from '../auth/viewer';
import type { Services } from '../services';
import { calendarGround } from './calendarGround';
import { skedsForCalendar } from './skedsForCalendar';

const instant = z.iso
  .datetime({ error: 'Give the time as 2027-01-20T22:00:00Z.' })
  .transform((text) => Date.parse(text));

export const calendarQuerySchema = z
  .object({
    from: instant,
    to: instant,
    ground: z.string().max(200, 'That is not a ground of the calendar.').optional(),
  })
  .refine(({ from, to }) => !(to <= from || to - from > 62 * DAY_MS), {
    error: 'Ask for a span of at most 62 days whose end comes after its start.',
    path: ['to'],
  });

/** What the calendar shows of a span. */
export async function calendarData(
  services: Services,
  viewer: Viewer,
  { from, to, ground }: z.output<typeof calendarQuerySchema>,
): Promise<CalendarData> {
  const span = { startMs: from, endMs: to };
  return {
    skeds: await skedsForCalendar(services, viewer, span),
    ground: ground ? await calendarGround(services, viewer, ground, span) : [],
  };
}
