import { crewRoleSchema } from '../../../../../../domain/station/schema';
import { requirePerson } from '../../../../../../server/auth/guards';
import { endpoint, json, readJson } from '../../../../../../server/http/respond';
import { services } from '../../../../../../server/services';
import { changeCrewRole } from '../../../../../../server/stations/changeCrewRole';
import { removeCrew } from '../../../../../../server/stations/removeCrew';

export const PUT = endpoint(async (context) => {
  const viewer = requirePerson(context);
  const { crewRole } = await readJson(context.request, crewRoleSchema);
  const { id, personId } = context.params;
  await changeCrewRole(services(), viewer, id!, personId!, crewRole);
  return json({});
});

export const DELETE = endpoint(async (context) => {
  const viewer = requirePerson(context);
  const { id, personId } = context.params;
  await removeCrew(services(), viewer, id!, personId!);
  return json({});
});
