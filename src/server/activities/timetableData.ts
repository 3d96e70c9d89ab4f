import { MOON_STEP_MINUTES, type TimetableView } from '../../domain/activity/timetableView';
import type { LeftOut } from '../../domain/activity/plan/findings';
import { buildMoonTable } from '../../domain/ephemeris';
import { MINUTE_MS } from '../../domain/time/interval';
import type { Viewer } from '../auth/viewer';
import type { Services } from '../services';
import { requireEditor } from './access';
import { draftGround, planSlotOf } from './draftGround';
import { loadRoster } from './loadRoster';
import { activityView } from './records';
import { publishedRevisions } from './revisions';

/** The draft of an activity as its timetable shows it. Throws `NotFound`, `Forbidden`, or `Conflict` as `draftGround`. */
export async function timetableData(
  services: Services,
  viewer: Pick<Viewer, 'id' | 'role'>,
  slug: string,
): Promise<TimetableView> {
  const activity = await requireEditor(services.db, viewer, slug);
  const nowMs = services.now();
  const view = await activityView(services.db, activity, nowMs);
  const { draft, saved, problem } = await draftGround(services.db, activity.id);
  const roster = await loadRoster(services.db, activity);
  const table = buildMoonTable(view);
  const known = new Set(problem.wishes.map(({ id }) => id));
  const times: number[] = [];
  for (let at = view.startMs; at <= view.endMs; at += MOON_STEP_MINUTES * MINUTE_MS) times.push(at);
  return {
    slug: activity.slug,
    title: activity.title,
    startMs: view.startMs,
    endMs: view.endMs,
    number: draft.row.number,
    version: draft.row.version,
    published: (await publishedRevisions(services.db, activity.id)).length > 0,
    bands: view.bands,
    problem,
    leftOut: JSON.parse(draft.row.left_out_json) as LeftOut[],
    stations: saved.input.stations.map((station, index) => {
      const entry = roster.stations.find(({ stationId }) => stationId === station.id);
      return {
        id: station.id,
        place: entry?.place ?? index + 1,
        callSign: station.callSign,
        name: entry?.name ?? '',
        timeZone: entry?.timeZone ?? 'UTC',
        usable: station.usable ?? [{ startMs: view.startMs, endMs: view.endMs }],
        moonElevationDeg: times.map(
          (timeMs) => Math.round(table.sample(station.site, timeMs).elevationDeg * 10) / 10,
        ),
      };
    }),
    // A slot that has begun, of a station that is no longer coming, stays in the plan but has no row here.
    slots: draft.slots
      .filter((slot) => known.has(planSlotOf(slot).wishId))
      .map((slot) => ({
        ...planSlotOf(slot),
        pinned: slot.pinned,
        chance: slot.chance,
        marginDb: slot.marginDb,
        begun: slot.startMs <= nowMs,
      })),
  };
}
