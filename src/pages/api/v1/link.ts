import { openToAll } from '../../../server/auth/guards';
import { limitCalculator } from '../../../server/http/rateLimit';
import { endpoint, json, readJson } from '../../../server/http/respond';
import { computeLinkAnswer } from '../../../server/windows/computeLink';
import { linkRequestSchema } from '../../../server/windows/linkSchemas';

export const POST = endpoint(async (context) => {
  openToAll(context);
  await limitCalculator(context);
  return json(computeLinkAnswer(await readJson(context.request, linkRequestSchema)));
});
