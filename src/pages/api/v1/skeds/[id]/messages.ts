import type { APIRoute } from 'astro';
import { requirePerson } from '../../../../../server/auth/guards';
import { endpoint, json, readJson } from '../../../../../server/http/respond';
import { services } from '../../../../../server/services';
import { messageSchema, postMessage } from '../../../../../server/skeds/postMessage';
import { talkOf } from '../../../../../server/skeds/talk';
import { messageToJson } from '../../../../../server/skeds/toJson';

export const GET: APIRoute = endpoint(async (context) => {
  const viewer = requirePerson(context);
  const talk = await talkOf(services(), viewer, context.params['id'] ?? '');
  return json({
    messages: talk.messages.map(messageToJson),
    as: talk.as,
    openUntil: new Date(talk.openUntilMs).toISOString(),
  });
});

export const POST: APIRoute = endpoint(async (context) => {
  const viewer = requirePerson(context);
  const input = await readJson(context.request, messageSchema);
  const message = await postMessage(services(), viewer, context.params['id'] ?? '', input);
  return json(messageToJson(message), 201);
});
