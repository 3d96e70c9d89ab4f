import { requirePerson } from '../../../../../../server/auth/guards';
import { endpoint, json } from '../../../../../../server/http/respond';
import { services } from '../../../../../../server/services';
import { removeNoiseRecord } from '../../../../../../server/stations/removeNoiseRecord';

export const DELETE = endpoint(async (context) => {
  const viewer = requirePerson(context);
  const { id, recordId } = context.params;
  await removeNoiseRecord(services(), viewer, id!, recordId!);
  return json({});
});
