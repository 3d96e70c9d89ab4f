import type { APIRoute } from 'astro';
import { requirePerson } from '../../../../../server/auth/guards';
import { endpoint, json, readJson } from '../../../../../server/http/respond';
import { services } from '../../../../../server/services';
import { setSheet, sheetSettingsSchema } from '../../../../../server/skeds/setSheet';

export const PUT: APIRoute = endpoint(async (context) => {
  const viewer = requirePerson(context);
  const settings = await readJson(context.request, sheetSettingsSchema);
  return json(await setSheet(services(), viewer, context.params['id'] ?? '', settings));
});
