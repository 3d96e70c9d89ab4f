import { openToAll } from '../../../server/auth/guards';
import { limitCalculator } from '../../../server/http/rateLimit';
import { endpoint, json, readJson } from '../../../server/http/respond';
import { moonRequestSchema } from '../../../server/windows/calculatorSchemas';
import { computeMoonSamples } from '../../../server/windows/moonSamples';

export const POST = endpoint(async (context) => {
  openToAll(context);
  await limitCalculator(context);
  return json(computeMoonSamples(await readJson(context.request, moonRequestSchema)));
});
