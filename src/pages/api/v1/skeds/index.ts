import type { APIRoute } from 'astro';
import { requirePerson } from '../../../../server/auth/guards';
import { checked, endpoint, json, readJson } from '../../../../server/http/respond';
import { services } from '../../../../server/services';
import { listSkeds, skedFilterSchema } from '../../../../server/skeds/listSkeds';
import { offerSked } from '../../../../server/skeds/offerSked';
import { skedOfferSchema } from '../../../../server/skeds/schemas';
import { summaryToJson } from '../../../../server/skeds/toJson';

export const GET: APIRoute = endpoint(async (context) => {
  const viewer = requirePerson(context);
  const filter = checked(skedFilterSchema, Object.fromEntries(context.url.searchParams));
  const { skeds, next } = await listSkeds(services(), viewer, filter);
  return json({ skeds: skeds.map(summaryToJson), next });
});

export const POST: APIRoute = endpoint(async (context) => {
  const viewer = requirePerson(context);
  const input = await readJson(context.request, skedOfferSchema);
  return json(await offerSked(services(), viewer, input), 201);
});
