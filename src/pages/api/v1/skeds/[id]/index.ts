import type { APIRoute } from 'astro';
import { requirePerson } from '../../../../../server/auth/guards';
import { endpoint, json } from '../../../../../server/http/respond';
import { services } from '../../../../../server/services';
import { getSked } from '../../../../../server/skeds/getSked';
import { skedToJson } from '../../../../../server/skeds/toJson';

export const GET: APIRoute = endpoint(async (context) => {
  const viewer = requirePerson(context);
  const { view } = await getSked(services(), viewer, context.params['id'] ?? '');
  return json(skedToJson(view));
});
