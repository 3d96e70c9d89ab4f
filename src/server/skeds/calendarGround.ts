import type { CalendarGround } from '../../domain/sked/calendarView';
import type { Interval } from '../../domain/time/interval';
import { expandUsableHours } from '../../domain/time/weeklyHours';
import { findCommonWindows, visibleIntervals } from '../../domain/window';
import type { Viewer } from '../auth/viewer';
import { NotFound } from '../errors';
import type { Services } from '../services';
import { partyStation, type PartyStation } from './load';
import { myStations } from './myStations';

/** What the viewer can lay behind the calendar: the Moon over each own station, and each pair that has had a sked. */
export async function calendarGrounds(
  services: Services,
  viewer: Viewer,
): Promise<CalendarGround[]> {
  const own = await myStations(services, viewer);
  const grounds = own.map(({ id, callSign }) => ({
    key: `moon:${id}`,
    label: `the Moon over ${callSign}`,
  }));
  for (const station of own) {
    for (const partner of await partnersOfStation(services, station)) {
      grounds.push({
        key: `pair:${station.id}:${partner.id}`,
        label: `common windows of ${station.callSign} and ${partner.callSign}`,
      });
    }
  }
  return grounds;
}

/**
 * The intervals of one ground within the span. A pair counts the hours in which both are awake. Throws `NotFound` for a
 * ground that is not among the viewer's.
 */
export async function calendarGround(
  services: Services,
  viewer: Viewer,
  key: string,
  span: Interval,
): Promise<Interval[]> {
  const [kind, ownId, partnerId] = key.split(':');
  const own = (await myStations(services, viewer)).find((station) => station.id === ownId);
  if (!own) throw noSuchGround();
  if (kind === 'moon') {
    const { callSign, site, sky } = own;
    return visibleIntervals({ callSign, site, sky }, span);
  }
  const partner = (await partnersOfStation(services, own)).find(({ id }) => id === partnerId);
  if (kind !== 'pair' || !partner) throw noSuchGround();
  const { windows } = findCommonWindows({
    ...span,
    stations: [own, partner].map(({ callSign, site, sky, hours }) => ({
      callSign,
      site,
      sky,
      usable: expandUsableHours(hours, span),
    })),
    minimumMinutes: 10,
  });
  return windows.map(({ startMs, endMs }) => ({ startMs, endMs }));
}

function noSuchGround(): NotFound {
  return new NotFound('That is not one of your stations or sked partners.');
}

/** Stations with which the station has or had a sked, by call sign. */
async function partnersOfStation({ db }: Services, own: PartyStation): Promise<PartyStation[]> {
  const rows = await db
    .selectFrom('station')
    .selectAll()
    .where('id', 'in', (parties) =>
      parties
        .selectFrom('sked_party as other')
        .innerJoin('sked_party as mine', 'mine.sked_id', 'other.sked_id')
        .select('other.station_id')
        .where('mine.station_id', '=', own.id),
    )
    .where('id', '<>', own.id)
    .orderBy('call_sign')
    .limit(50)
    .execute();
  return rows.map(partyStation);
}
