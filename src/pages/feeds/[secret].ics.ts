import type { APIRoute } from 'astro';
import { openToAll } from '../../server/auth/guards';
import { calendarResponse } from '../../server/feeds/calendarResponse';
import { readFeed } from '../../server/feeds/readFeed';
import { services } from '../../server/services';

/** A calendar program reads a feed. The address is the secret; no session counts here. */
export const GET: APIRoute = async (context) => {
  openToAll(context);
  const feed = await readFeed(services(), context.params['secret'] ?? '');
  return calendarResponse(context.request, feed, 'private, no-cache', {
    'referrer-policy': 'no-referrer',
    'x-robots-tag': 'noindex',
  });
};
