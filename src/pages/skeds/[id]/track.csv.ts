import type { APIRoute } from 'astro';
import { requirePerson } from '../../../server/auth/guards';
import { services } from '../../../server/services';
import { skedTrack } from '../../../server/skeds/skedTrack';

export const GET: APIRoute = async (context) => {
  const viewer = requirePerson(context);
  const { fileName, csv } = await skedTrack(services(), viewer, context.params['id'] ?? '', {
    station: context.url.searchParams.get('station'),
    step: context.url.searchParams.get('step'),
  });
  return new Response(csv, {
    headers: {
      'content-type': 'text/csv; charset=utf-8; header=present',
      'content-disposition': `attachment; filename="${fileName}"`,
    },
  });
};
