import { profileUpdateSchema } from '../../../../../domain/station/schema';
import { requirePerson } from '../../../../../server/auth/guards';
import { endpoint, json, readJson } from '../../../../../server/http/respond';
import { services } from '../../../../../server/services';
import { updateProfile } from '../../../../../server/stations/updateProfile';

export const PUT = endpoint(async (context) => {
  const viewer = requirePerson(context);
  const input = await readJson(context.request, profileUpdateSchema);
  return json(await updateProfile(services(), viewer, context.params['id']!, input));
});
