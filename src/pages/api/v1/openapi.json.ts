import { openToAll } from '../../../server/auth/guards';
import { openApiDocument } from '../../../server/http/openapi';
import { endpoint, json } from '../../../server/http/respond';

export const GET = endpoint((context) => {
  openToAll(context);
  return Promise.resolve(json(openApiDocument(), 200, { 'cache-control': 'public, max-age=300' }));
});
