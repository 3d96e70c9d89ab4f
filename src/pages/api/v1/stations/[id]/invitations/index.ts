import { crewInvitationSchema } from '../../../../../../domain/station/schema';
import { requirePerson } from '../../../../../../server/auth/guards';
import { endpoint, json, readJson } from '../../../../../../server/http/respond';
import { services } from '../../../../../../server/services';
import { inviteCrew } from '../../../../../../server/stations/inviteCrew';

export const POST = endpoint(async (context) => {
  const viewer = requirePerson(context);
  const input = await readJson(context.request, crewInvitationSchema);
  return json(await inviteCrew(services(), viewer, context.params['id']!, input), 201);
});
