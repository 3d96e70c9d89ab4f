import { equipmentUpdateSchema } from '../../../../../domain/station/schema';
import { requirePerson } from '../../../../../server/auth/guards';
import { endpoint, json, readJson } from '../../../../../server/http/respond';
import { services } from '../../../../../server/services';
import { updateEquipment } from '../../../../../server/stations/updateEquipment';

export const PUT = endpoint(async (context) => {
  const viewer = requirePerson(context);
  const input = await readJson(context.request, equipmentUpdateSchema);
  return json(await updateEquipment(services(), viewer, context.params['id']!, input));
});
