import { openToAll } from '../../../server/auth/guards';
import { limitCalculator } from '../../../server/http/rateLimit';
import { endpoint, json } from '../../../server/http/respond';
import { outlookAnswer } from '../../../server/outlook/outlookApi';
import { services } from '../../../server/services';

export const GET = endpoint(async (context) => {
  const viewer = openToAll(context);
  await limitCalculator(context);
  return json(await outlookAnswer(services(), viewer, context.url.searchParams));
});
