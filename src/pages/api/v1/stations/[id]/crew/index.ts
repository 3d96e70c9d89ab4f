import { requirePerson } from '../../../../../../server/auth/guards';
import { endpoint, json } from '../../../../../../server/http/respond';
import { services } from '../../../../../../server/services';
import { listCrew } from '../../../../../../server/stations/listCrew';

export const GET = endpoint(async (context) => {
  const viewer = requirePerson(context);
  return json(await listCrew(services(), viewer, context.params['id']!));
});
