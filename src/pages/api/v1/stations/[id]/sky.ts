import { skyUpdateSchema } from '../../../../../domain/station/schema';
import { requirePerson } from '../../../../../server/auth/guards';
import { endpoint, json, readJson } from '../../../../../server/http/respond';
import { services } from '../../../../../server/services';
import { updateSky } from '../../../../../server/stations/updateSky';

export const PUT = endpoint(async (context) => {
  const viewer = requirePerson(context);
  const input = await readJson(context.request, skyUpdateSchema);
  return json(await updateSky(services(), viewer, context.params['id']!, input));
});
