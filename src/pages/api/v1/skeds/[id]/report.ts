import type { APIRoute } from 'astro';
import { requirePerson } from '../../../../../server/auth/guards';
import { endpoint, json, readJson } from '../../../../../server/http/respond';
import { services } from '../../../../../server/services';
import { reportSked } from '../../../../../server/skeds/reportSked';
import { skedReportSchema } from '../../../../../server/skeds/schemas';

export const POST: APIRoute = endpoint(async (context) => {
  const viewer = requirePerson(context);
  const input = await readJson(context.request, skedReportSchema);
  return json(await reportSked(services(), viewer, context.params['id'] ?? '', input));
});
