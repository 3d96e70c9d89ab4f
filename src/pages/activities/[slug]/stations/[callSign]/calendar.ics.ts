import type { APIRoute } from 'astro';
import { activityAccess } from '../../../../../server/activities/access';
import { planCalendar } from '../../../../../server/activities/planCalendar';
import { openToAll } from '../../../../../server/auth/guards';
import { calendarResponse } from '../../../../../server/feeds/calendarResponse';
import { services } from '../../../../../server/services';

/** One station's slots of the published plan for a calendar program; no sign-in. */
export const GET: APIRoute = async (context) => {
  const viewer = openToAll(context);
  const { slug = '', callSign = '' } = context.params;
  const { row } = await activityAccess(services().db, viewer, slug);
  const calendar = await planCalendar(services(), row, callSign);
  return calendarResponse(context.request, calendar, 'public, max-age=300');
};
