import type { APIRoute } from 'astro';
import { activityAccess } from '../../../server/activities/access';
import { planCalendar } from '../../../server/activities/planCalendar';
import { openToAll } from '../../../server/auth/guards';
import { calendarResponse } from '../../../server/feeds/calendarResponse';
import { services } from '../../../server/services';

/** The published plan for a calendar program; no sign-in. */
export const GET: APIRoute = async (context) => {
  const viewer = openToAll(context);
  const { row } = await activityAccess(services().db, viewer, context.params['slug'] ?? '');
  return calendarResponse(
    context.request,
    await planCalendar(services(), row),
    'public, max-age=300',
  );
};
