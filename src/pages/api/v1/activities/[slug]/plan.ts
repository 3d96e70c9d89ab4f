import type { APIRoute } from 'astro';
import { askForPlan, askForPlanSchema } from '../../../../../server/activities/askForPlan';
import { planRunOf } from '../../../../../server/activities/planRunOf';
import { stopPlan } from '../../../../../server/activities/stopPlan';
import { requireRole } from '../../../../../server/auth/guards';
import { endpoint, json, readJson } from '../../../../../server/http/respond';
import { services } from '../../../../../server/services';

/** The newest run: how far it is, or how it ended. */
export const GET: APIRoute = endpoint(async (context) => {
  const viewer = requireRole(context, 'coordinator');
  return json({ run: await planRunOf(services(), viewer, context.params['slug'] ?? '') });
});

export const POST: APIRoute = endpoint(async (context) => {
  const viewer = requireRole(context, 'coordinator');
  const input = await readJson(context.request, askForPlanSchema);
  return json(await askForPlan(services(), viewer, context.params['slug'] ?? '', input), 202);
});

/** Stops the run and keeps its best plan so far. */
export const DELETE: APIRoute = endpoint(async (context) => {
  const viewer = requireRole(context, 'coordinator');
  await stopPlan(services(), viewer, context.params['slug'] ?? '');
  return json({ stopping: true }, 202);
});
