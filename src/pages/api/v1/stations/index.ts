import { newStationSchema } from '../../../../domain/station/schema';
import { openToAll, requirePerson } from '../../../../server/auth/guards';
import { checked, endpoint, json, readJson } from '../../../../server/http/respond';
import { services } from '../../../../server/services';
import { createStation } from '../../../../server/stations/createStation';
import {
  listPublicStations,
  stationSearchSchema,
} from '../../../../server/stations/listPublicStations';

export const GET = endpoint(async (context) => {
  openToAll(context);
  const search = checked(stationSearchSchema, Object.fromEntries(context.url.searchParams));
  return json(await listPublicStations(services(), search));
});

export const POST = endpoint(async (context) => {
  const viewer = requirePerson(context);
  const input = await readJson(context.request, newStationSchema);
  return json(await createStation(services(), viewer, input), 201);
});
