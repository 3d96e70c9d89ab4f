import { inTransaction } from '../db/transaction';
import { Conflict, NotFound } from '../errors';
import type { Services } from '../services';
import { GUEST_LINK_MS } from '../skeds/linkForRecipient';
import { findGuestLink } from './guestLink';
import { sendLinkMail } from './linkMail';

/**
 * Mails a fresh link to the address that the given one went to, whatever became of that. To an address that wants no
 * mail, or is locked out, nothing is sent. Throws `NotFound`, or `Conflict` once nothing can be answered any more.
 */
export async function mailFreshLink(services: Services, secret: string): Promise<void> {
  await inTransaction(services.db, async (tx) => {
    const link = await findGuestLink({ db: tx, now: services.now }, secret);
    if (!link) throw new NotFound('This link is not one of ours, or a part of it is missing.');
    const { end_at: endMs } = await tx
      .selectFrom('sked')
      .select('end_at')
      .where('id', '=', link.skedId)
      .executeTakeFirstOrThrow();
    if (endMs + GUEST_LINK_MS <= services.now()) {
      throw new Conflict('The sked was over more than two weeks ago, so no more link is sent.');
    }
    await sendLinkMail(
      tx,
      services,
      { skedId: link.skedId, personId: link.person.id },
      {
        title: 'A fresh link to your sked',
        paragraph: 'You asked for it on the page behind an earlier one. It works once.',
      },
    );
  });
}
