import type {
  ActivityView,
  AnswerPartner,
  RosterStation,
  RosterWish,
} from '../../domain/activity/views';
import type { Viewer } from '../auth/viewer';
import { Forbidden, NotFound } from '../errors';
import type { Services } from '../services';
import { activityAccess, ownRosterStations } from './access';
import { readAnswerLink, type AnswerLink } from './answerLink';
import { loadRoster } from './loadRoster';
import { activityView, type ActivityRow } from './records';

export interface AnswerPage {
  activity: ActivityView;
  station: RosterStation;
  /** Stations for which the same person answers. */
  own: { stationId: string; callSign: string }[];
  /** What the station says of others; theirs about it are not told. */
  wishes: RosterWish[];
  partners: AnswerPartner[];
}

/**
 * The answer of a station, for its crew or for the coordinator. Without a station named, the first of the viewer's.
 * Throws `NotFound` or `Forbidden`.
 */
export async function getAnswerPage(
  services: Services,
  viewer: Pick<Viewer, 'id' | 'role'>,
  slug: string,
  stationId: string | null,
): Promise<AnswerPage & { editor: boolean }> {
  const { row, editor, own } = await activityAccess(services.db, viewer, slug);
  const id = stationId ?? own[0]?.stationId;
  if (!editor && !own.some((one) => one.stationId === id)) {
    throw new Forbidden('No station of yours is on this roster.');
  }
  return { ...(await answerPage(services, row, own, id)), editor };
}

/** The same page behind the link of a mail. Throws `NotFound`. */
export async function getAnswerPageByLink(
  services: Services,
  secret: string,
  stationId: string | null,
): Promise<AnswerPage & { link: AnswerLink }> {
  const link = await readAnswerLink(services.db, services, secret);
  const own = await ownRosterStations(services.db, link.activity.id, link.person.id);
  const id = own.find((one) => one.stationId === stationId)?.stationId ?? own[0]?.stationId;
  return { ...(await answerPage(services, link.activity, own, id)), link };
}

async function answerPage(
  services: Services,
  row: ActivityRow,
  own: AnswerPage['own'],
  stationId: string | undefined,
): Promise<AnswerPage> {
  const { stations, wishes } = await loadRoster(services.db, row);
  const station = stations.find((one) => one.stationId === stationId);
  if (!station) throw new NotFound('This station is not on the roster any more.');
  return {
    activity: await activityView(services.db, row, services.now()),
    station,
    own,
    wishes: wishes.filter((wish) => wish.stationId === station.stationId),
    partners: stations
      .filter((one) => one.stationId !== station.stationId)
      .map(({ stationId: id, place, callSign, name, locator, bands, answer }) => ({
        stationId: id,
        place,
        callSign,
        name,
        locator,
        bands,
        answer,
      })),
  };
}
