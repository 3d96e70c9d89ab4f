import { calendarOf } from '../../domain/sked/standing';
import { paths } from '../../paths';
import type { Tx } from '../db/transaction';
import { skedCrewMail } from '../mail/templates/skedCrewMail';
import { skedFacts, type SkedRecipient } from '../mail/templates/skedFacts';
import type { Services } from '../services';
import { loadSked, type LoadedSked } from './load';
import { crewsOf, personalEntry } from './notify';
import { sendSkedMail } from './sendSkedMail';

/** The skeds ahead of a station enter the calendar of somebody who has just joined its crew. */
export async function giveEntries(
  tx: Tx,
  services: Services,
  stationId: string,
  personId: string,
): Promise<void> {
  for (const loaded of await skedsAhead(tx, services, stationId)) {
    const ids = loaded.stations.map((station) => station.id);
    const recipient = (await crewsOf(tx, ids)).find((person) => person.personId === personId);
    if (!recipient) return;
    const lapsed = loaded.sked.state === 'offered' && loaded.sked.startMs <= services.now();
    if (!lapsed) await tellOne(tx, services, loaded, recipient, { stationId, joined: true });
  }
}

/** They leave the calendar of somebody who was taken out of it, unless another party's crew still has the person. */
export async function withdrawEntries(
  tx: Tx,
  services: Services,
  stationId: string,
  personId: string,
): Promise<void> {
  const person = await tx
    .selectFrom('person')
    .select(['id', 'email', 'name', 'time_zone'])
    .where('id', '=', personId)
    .where('confirmed_at', 'is not', null)
    .where('locked_at', 'is', null)
    .executeTakeFirst();
  if (!person) return;
  const recipient: SkedRecipient = {
    personId,
    email: person.email,
    name: person.name,
    timeZone: person.time_zone,
    guest: false,
    stationIds: [],
  };
  for (const loaded of await skedsAhead(tx, services, stationId)) {
    const ids = loaded.stations.map((station) => station.id);
    const crews = await crewsOf(tx, ids);
    if (crews.some((one) => one.personId === personId)) continue;
    await tellOne(tx, services, loaded, recipient, { stationId, joined: false });
  }
}

async function tellOne(
  tx: Tx,
  services: Services,
  loaded: LoadedSked,
  recipient: SkedRecipient,
  { stationId, joined }: { stationId: string; joined: boolean },
): Promise<void> {
  const { row, stations } = loaded;
  const sked = { ...loaded.sked, sequence: loaded.sked.sequence + 1 };
  await tx.updateTable('sked').set({ sequence: sked.sequence }).where('id', '=', row.id).execute();
  const entry = personalEntry(sked, calendarOf(sked), recipient.stationIds, services.now());
  const facts = skedFacts(row, stations, sked, services.config.publicUrl + paths.sked(row.id));
  const mail = skedCrewMail(facts, recipient, {
    callSign: stations.find((station) => station.id === stationId)!.callSign,
    joined,
    asked: entry.asked,
    agreed: sked.state === 'agreed',
  });
  await sendSkedMail(tx, services, { sked: row, facts, recipient, ...mail, entry });
}

/** Offered and agreed skeds of the station that are not over. */
async function skedsAhead(tx: Tx, { now }: Services, stationId: string): Promise<LoadedSked[]> {
  const rows = await tx
    .selectFrom('sked')
    .innerJoin('sked_party', 'sked_party.sked_id', 'sked.id')
    .select('sked.id')
    .where('sked_party.station_id', '=', stationId)
    .where('sked_party.left_at', 'is', null)
    .where('sked.state', 'in', ['offered', 'agreed'])
    .where('sked.end_at', '>', now())
    .orderBy('sked.start_at')
    .execute();
  const skeds: LoadedSked[] = [];
  for (const { id } of rows) {
    const loaded = await loadSked(tx, id);
    if (loaded) skeds.push(loaded);
  }
  return skeds;
}
