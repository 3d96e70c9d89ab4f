import type { APIRoute } from 'astro';
import { requirePerson } from '../../../server/auth/guards';
import { skedFile } from '../../../server/feeds/skedFile';
import { services } from '../../../server/services';

export const GET: APIRoute = async (context) => {
  const viewer = requirePerson(context);
  const { fileName, body } = await skedFile(services(), viewer, context.params['id'] ?? '');
  return new Response(body, {
    headers: {
      'content-type': 'text/calendar; charset=utf-8',
      'content-disposition': `attachment; filename="${fileName}"`,
    },
  });
};
