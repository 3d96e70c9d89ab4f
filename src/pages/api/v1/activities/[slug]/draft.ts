import type { APIRoute } from 'astro';
import { changeDraft, draftChangeSchema } from '../../../../../server/activities/changeDraft';
import { timetableData } from '../../../../../server/activities/timetableData';
import { requireRole } from '../../../../../server/auth/guards';
import { endpoint, json, readJson } from '../../../../../server/http/respond';
import { services } from '../../../../../server/services';

export const GET: APIRoute = endpoint(async (context) => {
  const viewer = requireRole(context, 'coordinator');
  return json(await timetableData(services(), viewer, context.params['slug'] ?? ''));
});

export const POST: APIRoute = endpoint(async (context) => {
  const viewer = requireRole(context, 'coordinator');
  const input = await readJson(context.request, draftChangeSchema);
  return json(await changeDraft(services(), viewer, context.params['slug'] ?? '', input));
});
