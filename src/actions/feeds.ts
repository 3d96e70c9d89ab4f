import { z } from 'zod';
import { paths } from '../paths';
import { requirePerson } from '../server/auth/guards';
import { endFeed } from '../server/feeds/endFeed';
import { feedSchema, makeFeed } from '../server/feeds/makeFeed';
import { services } from '../server/services';
import { formAction } from './form';

export const feeds = {
  /** The page that answers shows the address; it is never shown again, so nothing is redirected. */
  make: formAction(feedSchema, async (input, context) => {
    const viewer = requirePerson(context);
    return makeFeed(services(), viewer, input);
  }),

  end: formAction(z.object({ id: z.string().min(1).max(64) }), async ({ id }, context) => {
    const viewer = requirePerson(context);
    await endFeed(services(), viewer, id);
    return { goTo: `${paths.calendar}?done=feed-ended#feeds` };
  }),
};
