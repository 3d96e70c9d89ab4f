import type { Config } from '../config';
import type { Tx } from '../db/transaction';
import type { SkedRecipient } from '../mail/templates/skedFacts';
import { loadSked, type LoadedSked } from '../skeds/load';
import { crewsOf } from '../skeds/notify';
import { replyAddress, replyTokensIn } from '../skeds/replyAddress';

export interface Answerer {
  loaded: LoadedSked;
  person: SkedRecipient;
  /** Stations of the person that are still in it. */
  stationIds: string[];
}

/**
 * Who answers about which sked: the person to whom the reply address that the mail came to belongs. The address cannot
 * be guessed and went to nobody else. Null when it is nobody's, or the person has no part in the sked any more.
 */
export async function whoAnswers(
  tx: Tx,
  config: Config,
  recipients: readonly string[],
  uid: string | null,
): Promise<Answerer | null> {
  if (replyTokensIn(config, recipients).length === 0) return null;
  const asked = uid === null ? await skedIdByAddress(tx, recipients) : await skedIdByUid(tx, uid);
  const loaded = asked === null ? null : await loadSked(tx, asked);
  if (!loaded) return null;
  const parties = loaded.sked.parties.map((party) => party.stationId);
  const person = (await crewsOf(tx, parties)).find(({ personId }) =>
    recipients.includes(replyAddress(config, loaded.row.uid, personId)!.toLowerCase()),
  );
  if (!person) return null;
  const stillIn = loaded.stations.map((station) => station.id);
  return {
    loaded,
    person,
    stationIds: person.stationIds.filter((id) => stillIn.includes(id)),
  };
}

async function skedIdByUid(tx: Tx, uid: string): Promise<string | null> {
  const row = await tx.selectFrom('sked').select('id').where('uid', '=', uid).executeTakeFirst();
  return row?.id ?? null;
}

/** The sked of the mails that asked for answers to this address. */
async function skedIdByAddress(tx: Tx, recipients: readonly string[]): Promise<string | null> {
  const row = await tx
    .selectFrom('outbox')
    .select('sked_id')
    .where('reply_to', 'in', [...recipients])
    .where('sked_id', 'is not', null)
    .executeTakeFirst();
  return row?.sked_id ?? null;
}
