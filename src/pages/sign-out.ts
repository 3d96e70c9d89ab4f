import type { APIRoute } from 'astro';
import { paths } from '../paths';
import { openToAll } from '../server/auth/guards';
import { signOut } from '../server/auth/session';

export const POST: APIRoute = async (context) => {
  openToAll(context);
  await signOut(context);
  return context.redirect(paths.home, 303);
};
