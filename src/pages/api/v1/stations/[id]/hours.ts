import { hoursUpdateSchema } from '../../../../../domain/station/schema';
import { requirePerson } from '../../../../../server/auth/guards';
import { endpoint, json, readJson } from '../../../../../server/http/respond';
import { services } from '../../../../../server/services';
import { updateHours } from '../../../../../server/stations/updateHours';

export const PUT = endpoint(async (context) => {
  const viewer = requirePerson(context);
  const input = await readJson(context.request, hoursUpdateSchema);
  return json(await updateHours(services(), viewer, context.params['id']!, input));
});
