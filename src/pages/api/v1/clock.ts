import type { APIRoute } from 'astro';
import { openToAll } from '../../../server/auth/guards';
import { endpoint, json } from '../../../server/http/respond';
import { services } from '../../../server/services';

/** The server's clock, for devices that compare theirs. */
export const GET: APIRoute = endpoint((context) => {
  openToAll(context);
  return Promise.resolve(json({ now: new Date(services().now()).toISOString() }));
});
