import type { APIRoute } from 'astro';
import { requirePerson } from '../../../server/auth/guards';
import { checked, endpoint, json } from '../../../server/http/respond';
import { services } from '../../../server/services';
import { calendarData, calendarQuerySchema } from '../../../server/skeds/calendarData';
import { summaryToJson } from '../../../server/skeds/toJson';

/** Skeds of the viewer's stations in a span, and what lies behind them. */
export const GET: APIRoute = endpoint(async (context) => {
  const viewer = requirePerson(context);
  const query = checked(calendarQuerySchema, Object.fromEntries(context.url.searchParams));
  const { skeds, ground } = await calendarData(services(), viewer, query);
  return json({
    skeds: skeds.map(summaryToJson),
    ground: ground.map(({ startMs, endMs }) => ({
      start: new Date(startMs).toISOString(),
      end: new Date(endMs).toISOString(),
    })),
  });
});
