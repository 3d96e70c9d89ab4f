import type { APIRoute } from 'astro';
import { paths } from '../paths';
import { openToAll } from '../server/auth/guards';
import { signOut } from '../server/auth/session';
import { forgetKept } from '../server/http/keptSheets';

export const POST: APIRoute = async (context) => {
  openToAll(context);
  await signOut(context);
  const answer = context.redirect(paths.home, 303);
  forgetKept(context.request, answer.headers, null);
  return answer;
};
