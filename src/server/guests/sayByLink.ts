import type { z } from 'zod';
import { inTransaction } from '../db/transaction';
import type { Services } from '../services';
import { loadSked } from '../skeds/load';
import type { messageSchema } from '../skeds/postMessage';
import { noSuchSked } from '../skeds/refusals';
import { addMessage, ownPartiesStillIn } from '../skeds/talk';
import type { Answering } from './answerByLink';
import { freshLink, useLink } from './guestLink';
import { sendLinkMail } from './linkMail';

/**
 * Writes to the other parties behind a link, and mails its author the next link, because a message goes to the others
 * only. Returns the path of the next link. Throws as `requireUsableLink` and `addMessage`.
 */
export async function sayByLink(
  services: Services,
  { secret, id }: Answering,
  { words, as }: z.output<typeof messageSchema>,
): Promise<string> {
  const link = await inTransaction(services.db, async (tx) => {
    const used = await useLink(tx, services, secret);
    const loaded = used.skedId === id ? await loadSked(tx, id) : null;
    const stationId = as ?? (loaded && (await ownPartiesStillIn(tx, loaded, used.person.id))[0]);
    if (!loaded || !stationId) throw noSuchSked();
    await addMessage(tx, services, {
      skedId: id,
      stationId,
      personId: used.person.id,
      words,
    });
    await sendLinkMail(
      tx,
      services,
      { skedId: id, personId: used.person.id },
      {
        title: 'Your message is on its way',
        paragraph: 'The others get it by mail. With this link you answer or write again.',
      },
    );
    return used;
  });
  return freshLink(services, link);
}
