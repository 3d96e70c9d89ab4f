import { parseQuestion, questionSpan } from '../../../../domain/window/question';
import { openToAll } from '../../../../server/auth/guards';
import { InvalidInput } from '../../../../server/errors';
import { endpoint, json } from '../../../../server/http/respond';
import { services } from '../../../../server/services';
import { loadSearchData } from '../../../../server/windows/loadSearchData';

/** What the windows page needs of the named stations within its dates: places as shown, hours, and skeds. */
export const GET = endpoint(async (context) => {
  const viewer = openToAll(context);
  const app = services();
  const { question, problems } = parseQuestion(context.url.searchParams, app.now());
  const loaded = await loadSearchData(app, viewer, question.stations, questionSpan(question));
  const all = [...problems, ...loaded.problems];
  if (all[0]) {
    throw new InvalidInput(
      all[0].sentence,
      all.map(({ field, sentence }) => ({ path: field, message: sentence })),
    );
  }
  return json({ stations: loaded.stations, taken: loaded.taken });
});
