import { openToAll } from '../../../server/auth/guards';
import { limitCalculator } from '../../../server/http/rateLimit';
import { endpoint, json, readJson } from '../../../server/http/respond';
import { windowsRequestSchema } from '../../../server/windows/calculatorSchemas';
import { searchWindows } from '../../../server/windows/searchWindows';

export const POST = endpoint(async (context) => {
  openToAll(context);
  await limitCalculator(context);
  return json(await searchWindows(await readJson(context.request, windowsRequestSchema)));
});
