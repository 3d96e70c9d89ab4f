import type { Db } from '../db/connection';
import { listed } from '../db/listed';
import type { Tx } from '../db/transaction';
import type { SkedRecipient } from '../mail/templates/skedFacts';
import { guestReached } from './recipients';

/** Somebody in the crew of a party that is still in the sked, who can be written to. */
export interface CrewMember extends SkedRecipient {
  /** The opposite of `guest`: without an account the mails carry a link that needs none. */
  account: boolean;
  /** Since when the person has belonged to the first of them. */
  sinceMs: number;
}

/**
 * The crews of the parties of skeds that can be written to, by sked, each person once: people with an account, and
 * keepers of stations described for them unless they want no such mail.
 */
export async function crewsOfSkeds(
  db: Db | Tx,
  skedIds: readonly string[],
): Promise<Map<string, CrewMember[]>> {
  const rows = await db
    .selectFrom('sked_party')
    .innerJoin('station', 'station.id', 'sked_party.station_id')
    .innerJoin('station_crew', 'station_crew.station_id', 'station.id')
    .innerJoin('person', 'person.id', 'station_crew.person_id')
    .select([
      'sked_party.sked_id',
      'person.id',
      'person.email',
      'person.name',
      'person.time_zone',
      'person.confirmed_at',
      'station_crew.station_id',
      'station_crew.added_at',
    ])
    .where('sked_party.sked_id', 'in', (ids) => ids.selectFrom(listed(skedIds)).select('value'))
    .where('sked_party.left_at', 'is', null)
    .where('person.locked_at', 'is', null)
    .where((or) => or.or([or('person.confirmed_at', 'is not', null), guestReached(or)]))
    .orderBy('person.email')
    .orderBy('sked_party.place')
    .execute();
  const crews = new Map<string, CrewMember[]>();
  for (const row of rows) {
    let crew = crews.get(row.sked_id);
    if (!crew) crews.set(row.sked_id, (crew = []));
    const known = crew.find((member) => member.personId === row.id);
    if (known) {
      known.stationIds.push(row.station_id);
      known.sinceMs = Math.min(known.sinceMs, row.added_at);
      continue;
    }
    crew.push({
      personId: row.id,
      email: row.email,
      name: row.name,
      timeZone: row.time_zone,
      account: row.confirmed_at !== null,
      guest: row.confirmed_at === null,
      stationIds: [row.station_id],
      sinceMs: row.added_at,
    });
  }
  return crews;
}
