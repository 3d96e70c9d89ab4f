import { requirePerson } from '../../../../../../server/auth/guards';
import { endpoint, json } from '../../../../../../server/http/respond';
import { services } from '../../../../../../server/services';
import { withdrawInvitation } from '../../../../../../server/stations/withdrawInvitation';

export const DELETE = endpoint(async (context) => {
  const viewer = requirePerson(context);
  const { id, invitationId } = context.params;
  await withdrawInvitation(services(), viewer, id!, invitationId!);
  return json({});
});
