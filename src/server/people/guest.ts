import { locatorToPosition } from '../../domain/locator/locator';
import type { SkyLimits } from '../../domain/sky/limits';
import type { StationHours } from '../../domain/station/hoursSchema';
import type { Tx } from '../db/transaction';
import { InvalidInput } from '../errors';
import { newId } from '../ids';
import type { Services } from '../services';

/** Somebody without an account, as whoever writes to them describes them. */
export interface GuestGiven {
  callSign: string;
  /** In lower case. */
  email: string;
  locator: string;
  /** Default: the call sign. */
  name?: string | undefined;
  /** Default: nautical time at the longitude. */
  timeZone?: string | undefined;
}

export interface Guest {
  personId: string;
  stationId: string;
  /** Whether the person has a confirmed account. */
  confirmed: boolean;
}

/** What is assumed until they say otherwise: the sky above 5°, and awake from 8 to 23 by their clock. */
const ASSUMED_SKY: SkyLimits = { elevationFromDeg: 5 };
const ASSUMED_HOURS: StationHours = {
  weekly: ([1, 2, 3, 4, 5, 6, 7] as const).map((weekday) => ({
    weekday,
    from: '08:00',
    to: '23:00',
  })),
  daysOff: [],
};

/** Four characters are enough to find windows, and all that is shown of a place somebody else has told. */
const SHOWN_LOCATOR_LENGTH = 4;

/**
 * The person behind an address and their station under a call sign, made where they are not there: a person without
 * an account and a guest station that they keep. A station that is there already is left as it is. Throws
 * `InvalidInput` for an address that cannot be written to.
 */
export async function findOrMakeGuest(
  tx: Tx,
  services: Pick<Services, 'now'>,
  given: GuestGiven,
): Promise<Guest> {
  const blocked = await tx
    .selectFrom('mail_block')
    .select('email')
    .where('email', '=', given.email)
    .executeTakeFirst();
  const person = await tx
    .selectFrom('person')
    .select(['id', 'confirmed_at', 'locked_at'])
    .where('email', '=', given.email)
    .executeTakeFirst();
  if (blocked || (person && person.locked_at !== null)) {
    const message = `${given.email} cannot be written to.`;
    throw new InvalidInput(message, [{ path: 'email', message }]);
  }
  const personId = person?.id ?? (await insertPerson(tx, services, given));
  const station = await tx
    .selectFrom('station')
    .innerJoin('station_crew', 'station_crew.station_id', 'station.id')
    .select('station.id')
    .where('station.call_sign', '=', given.callSign)
    .where('station_crew.person_id', '=', personId)
    .orderBy('station.guest')
    .executeTakeFirst();
  return {
    personId,
    stationId: station?.id ?? (await insertStation(tx, services, personId, given)),
    confirmed: person !== undefined && person.confirmed_at !== null,
  };
}

async function insertPerson(
  tx: Tx,
  { now }: Pick<Services, 'now'>,
  given: GuestGiven,
): Promise<string> {
  const id = newId();
  await tx
    .insertInto('person')
    .values({
      id,
      email: given.email,
      name: given.name?.trim() || given.callSign,
      password_hash: null,
      role: 'operator',
      time_zone: timeZoneOf(given),
      confirmed_at: null,
      locked_at: null,
      sessions_valid_from: now(),
      created_at: now(),
    })
    .execute();
  return id;
}

async function insertStation(
  tx: Tx,
  { now }: Pick<Services, 'now'>,
  personId: string,
  given: GuestGiven,
): Promise<string> {
  const id = newId();
  const { latitudeDeg, longitudeDeg } = locatorToPosition(given.locator);
  await tx
    .insertInto('station')
    .values({
      id,
      call_sign: given.callSign,
      name: given.callSign,
      latitude_deg: latitudeDeg,
      longitude_deg: longitudeDeg,
      height_m: 0,
      locator: given.locator,
      public_locator_length: SHOWN_LOCATOR_LENGTH,
      time_zone: timeZoneOf(given),
      sky_json: JSON.stringify(ASSUMED_SKY),
      hours_json: JSON.stringify(ASSUMED_HOURS),
      listed: 0,
      guest: 1,
      created_at: now(),
      updated_at: now(),
    })
    .execute();
  await tx
    .insertInto('station_crew')
    .values({ station_id: id, person_id: personId, crew_role: 'keeper', added_at: now() })
    .execute();
  return id;
}

/** "Etc/GMT-2" is two hours ahead of UTC: the sign of these names is turned round. */
function timeZoneOf({ timeZone, locator }: GuestGiven): string {
  if (timeZone) return timeZone;
  const hours = Math.round(locatorToPosition(locator).longitudeDeg / 15);
  if (hours === 0) return 'UTC';
  return hours > 0 ? `Etc/GMT-${hours}` : `Etc/GMT+${-hours}`;
}
