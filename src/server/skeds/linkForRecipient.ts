import { DAY_MS } from '../../domain/time/interval';
import { paths } from '../../paths';
import type { Tx } from '../db/transaction';
import { newId, newSecret } from '../ids';
import type { Services } from '../services';

/** How long after its slot a sked can still be answered by link. */
export const GUEST_LINK_MS = 14 * DAY_MS;

interface LinkedSked {
  id: string;
  end_at: number;
}

/**
 * Where a mail about a sked leads its reader: people with an account to the given page, everybody else to a fresh link
 * that needs no account, for this sked and this person, until two weeks after the slot.
 */
export async function linkForRecipient(
  tx: Tx,
  services: Pick<Services, 'config' | 'now'>,
  recipient: { personId: string; account: boolean },
  sked: LinkedSked,
  path: string = paths.sked(sked.id),
): Promise<string> {
  const { publicUrl } = services.config;
  if (recipient.account) return publicUrl + path;
  const { secret, hash } = newSecret();
  await tx
    .insertInto('guest_link')
    .values({
      id: newId(),
      token_hash: hash,
      person_id: recipient.personId,
      sked_id: sked.id,
      created_at: services.now(),
      expires_at: sked.end_at + GUEST_LINK_MS,
      used_at: null,
    })
    .execute();
  return publicUrl + paths.answer(secret);
}
