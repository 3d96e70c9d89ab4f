import type { APIRoute } from 'astro';
import { requirePerson } from '../../../../../server/auth/guards';
import { endpoint, json, readJson } from '../../../../../server/http/respond';
import { services } from '../../../../../server/services';
import { dropOutSked } from '../../../../../server/skeds/dropOutSked';
import { skedAnswerSchema } from '../../../../../server/skeds/schemas';

export const POST: APIRoute = endpoint(async (context) => {
  const viewer = requirePerson(context);
  const input = await readJson(context.request, skedAnswerSchema);
  return json(await dropOutSked(services(), viewer, context.params['id'] ?? '', input));
});
