import { placeUpdateSchema } from '../../../../../domain/station/schema';
import { requirePerson } from '../../../../../server/auth/guards';
import { endpoint, json, readJson } from '../../../../../server/http/respond';
import { services } from '../../../../../server/services';
import { updatePlace } from '../../../../../server/stations/updatePlace';

export const PUT = endpoint(async (context) => {
  const viewer = requirePerson(context);
  const input = await readJson(context.request, placeUpdateSchema);
  return json(await updatePlace(services(), viewer, context.params['id']!, input));
});
