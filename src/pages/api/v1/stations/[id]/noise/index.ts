import { noiseRecordSchema } from '../../../../../../domain/station/noiseRecord';
import { requirePerson } from '../../../../../../server/auth/guards';
import { endpoint, json, readJson } from '../../../../../../server/http/respond';
import { services } from '../../../../../../server/services';
import { addNoiseRecord } from '../../../../../../server/stations/addNoiseRecord';
import { listNoiseRecords } from '../../../../../../server/stations/listNoiseRecords';

export const GET = endpoint(async (context) => {
  const viewer = requirePerson(context);
  return json({ records: await listNoiseRecords(services(), viewer, context.params['id']!) });
});

export const POST = endpoint(async (context) => {
  const viewer = requirePerson(context);
  const input = await readJson(context.request, noiseRecordSchema);
  return json(await addNoiseRecord(services(), viewer, context.params['id']!, input), 201);
});
