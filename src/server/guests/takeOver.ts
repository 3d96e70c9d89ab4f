import type { PersonRow } from '../db/tables';
import type { Tx } from '../db/transaction';
import { enqueueMail } from '../mail/outbox';
import { renderMail } from '../mail/shell';
import { takenOverContent } from '../mail/templates/takenOverMail';
import type { Services } from '../services';

/**
 * Makes the stations that others described for an address the person's own, now that the address is confirmed; they
 * stay unlisted until the person lists them. Where a registered station has the call sign, the station stays as it is,
 * with its skeds. A mail says which is which. Links without an account end here: there is one now.
 */
export async function takeOverGuestStations(
  tx: Tx,
  services: Services,
  person: Pick<PersonRow, 'id' | 'email' | 'name'>,
): Promise<void> {
  const stations = await tx
    .selectFrom('station')
    .innerJoin('station_crew', 'station_crew.station_id', 'station.id')
    .select(['station.id', 'station.call_sign'])
    .where('station_crew.person_id', '=', person.id)
    .where('station.guest', '=', 1)
    .orderBy('station.call_sign')
    .execute();
  if (stations.length === 0) return;
  const taken: string[] = [];
  const kept: string[] = [];
  for (const { id, call_sign: callSign } of stations) {
    const registered = await tx
      .selectFrom('station')
      .select('id')
      .where('guest', '=', 0)
      .where('call_sign', '=', callSign)
      .executeTakeFirst();
    if (registered) {
      kept.push(callSign);
      continue;
    }
    await tx
      .updateTable('station')
      .set({ guest: 0, updated_at: services.now() })
      .where('id', '=', id)
      .execute();
    taken.push(callSign);
  }
  await tx
    .updateTable('guest_link')
    .set({ used_at: services.now() })
    .where('person_id', '=', person.id)
    .where('used_at', 'is', null)
    .execute();
  const { subject, content } = takenOverContent(services.config.publicUrl, { taken, kept });
  await enqueueMail(tx, services, {
    to: person.email,
    subject,
    ...renderMail(content),
    personId: person.id,
  });
}
