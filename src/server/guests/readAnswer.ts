import type { TalkView } from '../../domain/sked/talk';
import type { Services } from '../services';
import { getSked } from '../skeds/getSked';
import { talkOf } from '../skeds/talk';
import { hoursOf, skyOf } from '../stations/records';
import { findGuestLink, viewerOf, type GuestLink } from './guestLink';
import type { StationRow } from '../db/tables';
import type { StationHours } from '../../domain/station/hoursSchema';
import type { SkyLimits } from '../../domain/sky/limits';

/** The person's station in the sked, where it is one that others described: its limits can be corrected. */
export interface OwnGuestStation {
  id: string;
  callSign: string;
  locator: string;
  timeZone: string;
  version: number;
  sky: SkyLimits;
  hours: StationHours;
}

export type Answer = GuestLink & {
  sked: Awaited<ReturnType<typeof getSked>>;
  own: OwnGuestStation | null;
  talk: TalkView;
};

/** Everything the page behind a link shows; null for a link that is not one of ours. Changes nothing. */
export async function readAnswer(services: Services, secret: string): Promise<Answer | null> {
  const link = await findGuestLink(services, secret);
  if (!link) return null;
  const sked = await getSked(services, viewerOf(link.person), link.skedId);
  const row = await services.db
    .selectFrom('station')
    .innerJoin('sked_party', 'sked_party.station_id', 'station.id')
    .innerJoin('station_crew', 'station_crew.station_id', 'station.id')
    .selectAll('station')
    .where('sked_party.sked_id', '=', link.skedId)
    .where('station_crew.person_id', '=', link.person.id)
    .where('station.guest', '=', 1)
    .orderBy('sked_party.place')
    .executeTakeFirst();
  const talk = await talkOf(services, viewerOf(link.person), link.skedId);
  return { ...link, sked, talk, own: row ? ownStation(row) : null };
}

function ownStation(row: StationRow): OwnGuestStation {
  return {
    id: row.id,
    callSign: row.call_sign,
    locator: row.locator,
    timeZone: row.time_zone,
    version: row.version,
    sky: skyOf(row),
    hours: hoursOf(row),
  };
}
