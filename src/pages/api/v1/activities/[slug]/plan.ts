import { requireRole } from '../../../../../server/auth/guards';
import { askForPlan, askForPlanSchema } from '../../../../../server/activities/askForPlan';
import { planRunOf } from '../../../../../server/activities/planRunOf';
import { stopPlan } from '../../../../../server/activities/stopPlan';
import { endpoint, json, readJson } from '../../../../../server/http/respond';
import { services } from '../../../../../server/services';

/** The newest run, for who watches it. */
export const GET = endpoint(async (context) => {
  const viewer = requireRole(context, 'coordinator');
  return json({ run: await planRunOf(services(), viewer, context.params['slug']!) });
});

export const POST = endpoint(async (context) => {
  const viewer = requireRole(context, 'coordinator');
  const how = await readJson(context.request, askForPlanSchema);
  return json(await askForPlan(services(), viewer, context.params['slug']!, how), 202);
});

/** Stops the run under way and keeps its best plan. */
export const DELETE = endpoint(async (context) => {
  const viewer = requireRole(context, 'coordinator');
  await stopPlan(services(), viewer, context.params['slug']!);
  return json({});
});
