import type { Viewer } from '../auth/viewer';
import type { Services } from '../services';
import { noSuchSked } from '../skeds/refusals';
import type { WithLink } from '../skeds/schemas';
import { freshLink, requireUsableLink, useLink, viewerOf } from './guestLink';

/** The secret of a link, and the sked that its page showed. */
export interface Answering {
  secret: string;
  id: string;
}

/**
 * Lets the person behind a link change its sked through the same use case as everybody else. The link is used up in the
 * transaction of the change, so that it counts once, and stays as it is when the change is refused. Returns the path of
 * the next link. Throws as `requireUsableLink` and as the use case.
 */
export async function answerByLink(
  services: Services,
  { secret, id }: Answering,
  change: (viewer: Viewer, link: Required<WithLink>) => Promise<unknown>,
): Promise<string> {
  const link = await requireUsableLink(services, secret);
  if (link.skedId !== id) throw noSuchSked();
  await change(viewerOf(link.person), {
    first: async (tx) => {
      await useLink(tx, services, secret);
    },
  });
  return freshLink(services, link);
}
