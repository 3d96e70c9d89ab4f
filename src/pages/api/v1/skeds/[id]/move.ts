import type { APIRoute } from 'astro';
import { requirePerson } from '../../../../../server/auth/guards';
import { endpoint, json, readJson } from '../../../../../server/http/respond';
import { services } from '../../../../../server/services';
import { moveSked } from '../../../../../server/skeds/moveSked';
import { skedMoveSchema } from '../../../../../server/skeds/schemas';

export const POST: APIRoute = endpoint(async (context) => {
  const viewer = requirePerson(context);
  const input = await readJson(context.request, skedMoveSchema);
  return json(await moveSked(services(), viewer, context.params['id'] ?? '', input));
});
