import { guestHours, guestSetup, guestSky, guestZone } from '../../domain/guest/guest';
import { isGuestToken, readGuestToken } from '../../domain/guest/token';
import { isLocator, locatorToPosition, normalizeLocator } from '../../domain/locator/locator';
import { BANDS } from '../../domain/station/bands';
import { coarseSky } from '../../domain/station/coarseSky';
import { isTimeZone } from '../../domain/time/format';
import type { Interval } from '../../domain/time/interval';
import { expandUsableHours } from '../../domain/time/weeklyHours';
import type { QuestionProblem } from '../../domain/window/question';
import type { ChosenStation, SearchData } from '../../domain/window/searchData';
import type { Viewer } from '../auth/viewer';
import { NotFound } from '../errors';
import type { Services } from '../services';
import { stationsForSearch } from '../stations/forSearch';
import { takenSlots } from './takenSlots';

type Person = Pick<Viewer, 'id'>;

export interface LoadedSearchData extends SearchData {
  problems: QuestionProblem[];
}

/**
 * What a question's stations are: listed ones by id or call sign, bare places by locator, people without an account as
 * described in the question itself. What cannot be found is
 * left out and told in `problems`. Positions are as the viewer may know them, and the sky of others is coarse for
 * visitors, because all of it goes to the browser. Equipment is that of the public page of each station.
 */
export async function loadSearchData(
  services: Services,
  viewer: Person | null,
  tokens: readonly string[],
  span: Interval,
): Promise<LoadedSearchData> {
  const ids = await stationIds(services, viewer, tokens);
  const stations: ChosenStation[] = [];
  const problems: QuestionProblem[] = [];
  for (const token of tokens) {
    const id = ids.get(token);
    const station =
      id === undefined
        ? isGuestToken(token)
          ? guestStation(token, span)
          : placeStation(token)
        : await listedStation(services, viewer, token, id, span);
    if (typeof station === 'string') problems.push({ field: 'station', sentence: station });
    else if (stations.some((known) => known.callSign === station.callSign)) {
      problems.push({
        field: 'station',
        sentence: `${station.callSign} is named twice. Each station counts once.`,
      });
    } else stations.push(station);
  }
  const taken = await takenSlots(services.db, viewer, stations, span);
  return { stations, taken, problems };
}

async function stationIds(
  services: Services,
  viewer: Person | null,
  tokens: readonly string[],
): Promise<Map<string, string>> {
  if (tokens.length === 0) return new Map();
  const rows = await services.db
    .selectFrom('station')
    .select(['id', 'call_sign', 'listed'])
    .select((eb) =>
      eb
        .exists(
          eb
            .selectFrom('station_crew')
            .select('station_crew.person_id')
            .whereRef('station_crew.station_id', '=', 'station.id')
            .where('station_crew.person_id', '=', viewer?.id ?? ''),
        )
        .as('own'),
    )
    .where((eb) =>
      eb.or([
        eb('id', 'in', [...tokens]),
        eb(
          'call_sign',
          'in',
          tokens.map((token) => token.toUpperCase()),
        ),
      ]),
    )
    // A station that owns its call sign comes before one that others described with the same.
    .orderBy('guest')
    .execute();
  const known = new Map<string, string>();
  for (const token of tokens) {
    const row = rows.find(
      ({ id, call_sign, listed, own }) =>
        (id === token || call_sign === token.toUpperCase()) && (listed === 1 || Boolean(own)),
    );
    if (row) known.set(token, row.id);
  }
  return known;
}

async function listedStation(
  services: Services,
  viewer: Person | null,
  token: string,
  id: string,
  span: Interval,
): Promise<ChosenStation | string> {
  try {
    const [station] = await stationsForSearch(services.db, viewer, [id], span, 'viewer');
    const { callSign, site, sky, usable, name, locator, timeZone, equipment, own } = station!;
    return {
      token,
      id,
      callSign,
      site,
      sky: viewer ? sky : coarseSky(sky),
      usable,
      placeName: name.trim() === '' ? null : name,
      locator,
      timeZone,
      equipment,
      own,
    };
  } catch (error) {
    if (error instanceof NotFound) return error.message;
    throw error;
  }
}

/** Somebody without an account, or a sentence why not. */
function guestStation(token: string, span: Interval): ChosenStation | string {
  const place = readGuestToken(token);
  if (typeof place === 'string') return place;
  const { latitudeDeg, longitudeDeg } = locatorToPosition(place.locator);
  const timeZone = guestZone(place);
  const { dish } = place;
  return {
    token,
    id: null,
    callSign: place.callSign,
    site: { latitudeDeg, longitudeDeg, heightM: 0 },
    sky: guestSky(place),
    usable: expandUsableHours({ ...guestHours(place.hours), timeZone }, span),
    placeName: null,
    locator: place.locator,
    timeZone,
    equipment: dish ? BANDS.map(({ id }) => ({ band: id, setup: guestSetup(id, dish) })) : [],
    own: false,
    guest: place,
  };
}

/** A bare place from "JO97ee" or "JO97ee@Europe/Stockholm", or a sentence why not. */
function placeStation(token: string): ChosenStation | string {
  const [text, zone] = token.split('@', 2) as [string, string?];
  if (!isLocator(text)) {
    return `There is no listed station “${text}”, and it is not a locator such as JO97ee.`;
  }
  if (zone !== undefined && !isTimeZone(zone)) {
    return `“${zone}” is not a time zone such as Europe/Stockholm.`;
  }
  const { latitudeDeg, longitudeDeg } = locatorToPosition(text);
  const locator = normalizeLocator(text);
  return {
    token,
    id: null,
    callSign: locator,
    site: { latitudeDeg, longitudeDeg, heightM: 0 },
    sky: {},
    placeName: null,
    locator,
    timeZone: zone ?? null,
    equipment: [],
    own: false,
  };
}
