import { openToAll } from '../../../../../server/auth/guards';
import { endpoint, json } from '../../../../../server/http/respond';
import { services } from '../../../../../server/services';
import { getCrewStation, getPublicStation } from '../../../../../server/stations/getStation';

/** Everything for the crew, else what everybody may know. */
export const GET = endpoint(async (context) => {
  const viewer = openToAll(context);
  const id = context.params['id']!;
  const found = await getPublicStation(services(), viewer, id);
  if (viewer && found.crewRole) return json(await getCrewStation(services(), viewer, id));
  return json(found.station);
});
