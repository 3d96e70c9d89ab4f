import type { SkedSummary } from '../../domain/sked/view';
import type { BandId } from '../../domain/station/bands';
import type { Viewer } from '../auth/viewer';
import type { Services } from '../services';
import type { PartyStation } from '../skeds/load';
import { listSkeds } from '../skeds/listSkeds';
import { myStations } from '../skeds/myStations';
import { waitsForViewer, type Waiting } from '../skeds/waitsForViewer';
import { goodWindows, type GoodWindow } from './goodWindows';

export interface HomeData {
  /** The viewer's station that the page speaks of: the one of the next sked, else the first. */
  station: PartyStation | undefined;
  waiting: Waiting;
  next: SkedSummary | undefined;
  /** Coming skeds without the next, soonest first. */
  coming: SkedSummary[];
  band: BandId;
  windows: GoodWindow[];
}

const COMING = 6;

/** What the page shows to somebody who is signed in. */
export async function homeOf(services: Services, viewer: Viewer): Promise<HomeData> {
  const stations = await myStations(services, viewer);
  const waiting = await waitsForViewer(services, viewer);
  const { skeds } = await listSkeds(services, viewer, { when: 'coming' });
  const open = skeds.filter(
    (sked) => !sked.droppedOut && (sked.state === 'agreed' || sked.state === 'offered'),
  );
  const next = open.find((sked) => sked.state === 'agreed');
  const ownId = next?.parties.find((party) => party.mine)?.stationId;
  const station = stations.find(({ id }) => id === ownId) ?? stations[0];
  const last = next ?? open[0];
  return {
    station,
    waiting,
    next,
    coming: open.filter((sked) => sked !== next && !sked.waitsForViewer).slice(0, COMING),
    band: last?.band ?? (station ? await firstBand(services, station.id) : '1296'),
    windows: station ? await goodWindows(services, viewer, station) : [],
  };
}

async function firstBand({ db }: Services, stationId: string): Promise<BandId> {
  const rows = await db
    .selectFrom('station_band')
    .select('band')
    .where('station_id', '=', stationId)
    .execute();
  return rows.map((row) => row.band).sort((a, b) => Number(a) - Number(b))[0] ?? '1296';
}
