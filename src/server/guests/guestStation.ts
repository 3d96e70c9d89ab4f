import { DAY_MS } from '../../domain/time/interval';
import type { BandId } from '../../domain/station/bands';
import type { Viewer } from '../auth/viewer';
import type { Tx } from '../db/transaction';
import { Conflict, InvalidInput, TooManyRequests } from '../errors';
import { newId } from '../ids';
import { findPersonByEmail } from '../people/findPerson';
import type { Services } from '../services';
import type { PartyStation } from '../skeds/load';
import type { Guest } from './guestSchema';

/** Addresses to which one person may write for the first time within a day, by offering skeds. */
export const NEW_ADDRESSES_A_DAY = 20;
/** Unanswered offers of one person to one address, under whatever call sign. */
const OPEN_OFFERS = 5;
/** Offers of one person to one address within a day, those that were taken back too. */
export const OFFERS_A_DAY = 10;

interface Wanted {
  /** Band of the equipment that is described, where some is. */
  band: BandId | null;
  /** Path of the guest in the input, for problems. */
  field: string;
  newAddressesADay: number;
}

/**
 * The station to which an offer to somebody without an account goes, described as the offerer described it, whichever
 * it is, so that nothing else is learnt from it. Throws as `guestStation`, `TooManyRequests` after ten offers to the
 * address in a day, and `Conflict` while many offers wait for an answer.
 */
export async function stationForGuest(
  tx: Tx,
  services: Services,
  viewer: Viewer,
  guest: Guest,
  band: BandId,
  field: string,
): Promise<PartyStation> {
  const station = await guestStation(tx, services, viewer, guest, {
    band,
    field,
    newAddressesADay: NEW_ADDRESSES_A_DAY,
  });
  if (station.keeperId !== null) {
    await requireFewOffers(tx, services, viewer, station.keeperId, guest.callSign);
  }
  return describedStation(station.id, guest);
}

/**
 * The registered station of the call sign to whose crew the address belongs, else the one described for this address and
 * call sign before, else a new one that the person behind the address keeps. Throws `InvalidInput` for an address that
 * cannot be written to, `TooManyRequests` after so many new ones in a day. `keeperId`: null of a registered one.
 */
export async function guestStation(
  tx: Tx,
  services: Services,
  viewer: Pick<Viewer, 'id' | 'email'>,
  guest: Guest,
  { band, field, newAddressesADay }: Wanted,
): Promise<{ id: string; keeperId: string | null }> {
  const registered = await registeredStation(tx, guest);
  if (registered !== null) return { id: registered, keeperId: null };
  const path = field === '' ? 'email' : `${field}.email`;
  if (guest.email === viewer.email) {
    const message = 'That is your own address.';
    throw new InvalidInput(message, [{ path, message }]);
  }
  const person = await findPersonByEmail(tx, guest.email);
  if ((person && person.locked_at !== null) || (await isBlocked(tx, guest.email))) {
    const message = `${guest.email} cannot be written to.`;
    throw new InvalidInput(message, [{ path, message }]);
  }
  const personId = person?.id ?? (await insertPerson(tx, services, guest));
  await requireFewNewAddresses(tx, services, viewer, personId, newAddressesADay);
  const known = await tx
    .selectFrom('station')
    .innerJoin('station_crew', 'station_crew.station_id', 'station.id')
    .select('station.id')
    .where('station.guest', '=', 1)
    .where('station.call_sign', '=', guest.callSign)
    .where('station_crew.person_id', '=', personId)
    .executeTakeFirst();
  const id = known?.id ?? (await insertStation(tx, services, personId, guest, band));
  return { id, keeperId: personId };
}

function describedStation(id: string, guest: Guest): PartyStation {
  return {
    id,
    callSign: guest.callSign,
    timeZone: guest.timeZone,
    locator: guest.locator,
    site: { latitudeDeg: guest.latitudeDeg, longitudeDeg: guest.longitudeDeg, heightM: 0 },
    sky: guest.sky,
    hours: { ...guest.hours, timeZone: guest.timeZone },
    listed: false,
  };
}

/** The station that owns the call sign, if the address is that of a member of its crew who can sign in. */
async function registeredStation(tx: Tx, guest: Guest): Promise<string | null> {
  const row = await tx
    .selectFrom('station')
    .innerJoin('station_crew', 'station_crew.station_id', 'station.id')
    .innerJoin('person', 'person.id', 'station_crew.person_id')
    .select('station.id')
    .where('station.guest', '=', 0)
    .where('station.call_sign', '=', guest.callSign)
    .where('person.email', '=', guest.email)
    .where('person.confirmed_at', 'is not', null)
    .where('person.locked_at', 'is', null)
    .executeTakeFirst();
  return row?.id ?? null;
}

async function isBlocked(tx: Tx, email: string): Promise<boolean> {
  const row = await tx
    .selectFrom('mail_block')
    .select('email')
    .where('email', '=', email)
    .executeTakeFirst();
  return row !== undefined;
}

/** Counts the people to whom the viewer offered for the first time within the last day. */
async function requireFewNewAddresses(
  tx: Tx,
  { now }: Services,
  viewer: Pick<Viewer, 'id'>,
  personId: string,
  most: number,
): Promise<void> {
  const firsts = await tx
    .selectFrom('guest_offer')
    .select(['to_person_id', 'first_at'])
    .where('by_person_id', '=', viewer.id)
    .where((or) => or.or([or('first_at', '>', now() - DAY_MS), or('to_person_id', '=', personId)]))
    .orderBy('first_at')
    .execute();
  if (firsts.some((first) => first.to_person_id === personId)) return;
  if (firsts.length >= most) {
    throw new TooManyRequests(
      `You have written to ${most} new addresses within a day, which is the most. Nothing was sent.`,
      Math.max(1, Math.ceil((firsts[0]!.first_at + DAY_MS - now()) / 1000)),
    );
  }
  await tx
    .insertInto('guest_offer')
    .values({ by_person_id: viewer.id, to_person_id: personId, first_at: now() })
    .execute();
}

/** Whoever does not answer is not written to again and again, nor under other call signs, nor by offers taken back. */
async function requireFewOffers(
  tx: Tx,
  { now }: Services,
  viewer: Viewer,
  personId: string,
  callSign: string,
): Promise<void> {
  const dayBefore = now() - DAY_MS;
  const offers = await tx
    .selectFrom('sked')
    .innerJoin('sked_party', 'sked_party.sked_id', 'sked.id')
    .innerJoin('station', 'station.id', 'sked_party.station_id')
    .innerJoin('station_crew', 'station_crew.station_id', 'station.id')
    .innerJoin('sked_event', 'sked_event.sked_id', 'sked.id')
    .select(['sked.id', 'sked.state', 'sked.start_at', 'sked_party.answer', 'sked_event.at'])
    .where('station.guest', '=', 1)
    .where('station_crew.person_id', '=', personId)
    .where('sked_event.kind', '=', 'offered')
    .where('sked_event.person_id', '=', viewer.id)
    .where('sked.activity_id', 'is', null)
    .where((or) =>
      or.or([
        or('sked_event.at', '>', dayBefore),
        or.and([or('sked.state', '=', 'offered'), or('sked.start_at', '>', now())]),
      ]),
    )
    .orderBy('sked_event.at')
    .execute();
  const open = offers.filter(
    (offer) => offer.state === 'offered' && offer.start_at > now() && offer.answer === 'waiting',
  );
  if (new Set(open.map(({ id }) => id)).size >= OPEN_OFFERS) {
    throw new Conflict(
      `${callSign} has ${OPEN_OFFERS} offers of yours to answer already. Withdraw one, or wait for an answer.`,
    );
  }
  const today = offers.filter((offer) => offer.at > dayBefore);
  if (new Set(today.map(({ id }) => id)).size >= OFFERS_A_DAY) {
    throw new TooManyRequests(
      `You have written ${OFFERS_A_DAY} offers to ${callSign} within a day, which is the most. Nothing was sent.`,
      Math.max(1, Math.ceil((today[0]!.at + DAY_MS - now()) / 1000)),
    );
  }
}

async function insertPerson(tx: Tx, { now }: Services, guest: Guest): Promise<string> {
  const id = newId();
  await tx
    .insertInto('person')
    .values({
      id,
      email: guest.email,
      name: guest.callSign,
      password_hash: null,
      role: 'operator',
      time_zone: guest.timeZone,
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
  { now }: Services,
  personId: string,
  guest: Guest,
  band: BandId | null,
): Promise<string> {
  const id = newId();
  const at = now();
  await tx
    .insertInto('station')
    .values({
      id,
      call_sign: guest.callSign,
      name: guest.callSign,
      latitude_deg: guest.latitudeDeg,
      longitude_deg: guest.longitudeDeg,
      height_m: 0,
      locator: guest.locator,
      public_locator_length: Math.min(guest.locator.length, 6) as 4 | 6,
      time_zone: guest.timeZone,
      sky_json: JSON.stringify(guest.sky),
      hours_json: JSON.stringify(guest.hours),
      listed: 0,
      guest: 1,
      created_at: at,
      updated_at: at,
    })
    .execute();
  await tx
    .insertInto('station_crew')
    .values({ station_id: id, person_id: personId, crew_role: 'keeper', added_at: at })
    .execute();
  if (guest.setup && band) {
    await tx
      .insertInto('station_band')
      .values({ station_id: id, band, setup_json: JSON.stringify(guest.setup) })
      .execute();
  }
  return id;
}
