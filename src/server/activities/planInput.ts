import { assumedSetup } from '../../domain/activity/assumed';
import type { PlanInput, PlanInputStation } from '../../domain/activity/plan/input';
import { planPriority } from '../../domain/activity/weights';
import { wishedPairs } from '../../domain/activity/wishes';
import type { RosterStation, RosterWish } from '../../domain/activity/views';
import { bandById } from '../../domain/station/bands';
import { DAY_MS, subtractIntervals, type Interval } from '../../domain/time/interval';
import type { Db } from '../db/connection';
import type { Services } from '../services';
import { takenIntervals } from '../skeds/takenIntervals';
import { equipmentOf, skyOf } from '../stations/records';
import { loadRoster } from './loadRoster';
import { activityView, type ActivityRow } from './records';

/** As many contacts as fit. */
const NO_LIMIT = 999;

/** A wish of the plan is known by its pair, in an order that stays when the roster is numbered anew. */
export function wishIdOf(a: string, b: string): string {
  return a < b ? `${a} ${b}` : `${b} ${a}`;
}

/**
 * Everything that a plan of the activity depends on, as it stands now: the stations that are coming with sky, hours
 * without their other agreed skeds and without the slots that they gave back, equipment (assumed where none is
 * described), and their wishes.
 */
export async function planInput(services: Services, activity: ActivityRow): Promise<PlanInput> {
  const { db } = services;
  const view = await activityView(db, activity, services.now());
  const { stations, wishes, rows } = await loadRoster(db, activity);
  const coming = stations.filter(({ answer }) => answer === 'coming');
  const ids = coming.map(({ stationId }) => stationId);
  const equipment = await equipmentOf(db, ids);
  const own = await skedsOfActivity(db, activity.id);
  const givenBack = await givenBackBy(db, activity.id);
  const inputs: PlanInputStation[] = [];
  for (const station of coming) {
    const row = rows.get(station.stationId)!;
    const taken = await takenIntervals(
      db,
      [row.id],
      { startMs: view.startMs - DAY_MS, endMs: view.endMs + DAY_MS },
      own,
    );
    const described = equipment.get(row.id) ?? [];
    inputs.push({
      id: row.id,
      callSign: row.call_sign,
      site: {
        latitudeDeg: row.latitude_deg,
        longitudeDeg: row.longitude_deg,
        heightM: row.height_m,
      },
      sky: skyOf(row),
      usable: subtractIntervals(station.usable, [...taken, ...(givenBack.get(row.id) ?? [])]),
      setups: Object.fromEntries(
        station.bands.map((band) => [
          band,
          described.find((one) => one.band === band)?.setup ?? assumedSetup(band),
        ]),
      ),
      most: station.mostContacts ?? NO_LIMIT,
      never: neverOf(station, wishes),
    });
  }
  return {
    startMs: view.startMs,
    endMs: view.endMs,
    rules: {
      gridMinutes: view.gridMinutes,
      slotMinutes: view.slotMinutes,
      bandChangeMinutes: view.bandChangeMinutes,
      mostInARow: view.mostInARow,
      leastPauseMinutes: view.leastPauseMinutes,
      leastElevationDeg: view.weights.leastElevationDeg,
      leastChance: view.weights.leastChance,
    },
    bands: view.bands.map(({ band, frequencyMhz, mode }) => ({
      id: band,
      label: bandById(band).label,
      frequencyMhz,
      mode,
    })),
    stations: inputs,
    wishes: wishedPairs(coming.map(wishing), wishes).map(({ a, b, priority, bands }) => ({
      id: wishIdOf(a, b),
      a,
      b,
      priority: planPriority(priority, view.weights),
      bands,
    })),
  };
}

function wishing(station: RosterStation) {
  return {
    id: station.stationId,
    place: station.place,
    coming: true,
    bands: station.bands,
    wants: station.wants,
    priority: station.priority,
  };
}

function neverOf({ stationId }: RosterStation, wishes: readonly RosterWish[]): string[] {
  return wishes
    .filter((wish) => wish.kind === 'never' && wish.stationId === stationId)
    .map(({ partnerId }) => partnerId);
}

async function skedsOfActivity(db: Db, activityId: string): Promise<Set<string>> {
  const rows = await db
    .selectFrom('sked')
    .select('id')
    .where('activity_id', '=', activityId)
    .execute();
  return new Set(rows.map(({ id }) => id));
}

/** When a station gave a slot of the plan back: it is not there then, while its partner may be. */
async function givenBackBy(db: Db, activityId: string): Promise<Map<string, Interval[]>> {
  const rows = await db
    .selectFrom('sked_event')
    .innerJoin('sked', 'sked.id', 'sked_event.sked_id')
    .select(['sked_event.station_id', 'sked.start_at', 'sked.end_at'])
    .where('sked.activity_id', '=', activityId)
    .where('sked.state', '=', 'cancelled')
    .where('sked_event.kind', '=', 'cancelled')
    .where('sked_event.station_id', 'is not', null)
    .execute();
  const by = new Map<string, Interval[]>();
  for (const { station_id: id, start_at: startMs, end_at: endMs } of rows) {
    by.set(id!, [...(by.get(id!) ?? []), { startMs, endMs }]);
  }
  return by;
}
