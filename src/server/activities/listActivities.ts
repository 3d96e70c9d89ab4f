import { stageOf } from '../../domain/activity/states';
import type { ActivityCard } from '../../domain/activity/views';
import type { Viewer } from '../auth/viewer';
import type { Services } from '../services';

/**
 * Activities that the viewer may know of, coming ones first, then past ones from the last: published ones, those to
 * which a station of theirs is invited, their own, and all of them for administrators.
 */
export async function listActivities(
  services: Services,
  viewer: Pick<Viewer, 'id' | 'role'> | null,
): Promise<ActivityCard[]> {
  const { db } = services;
  const now = services.now();
  const rows = await db
    .selectFrom('activity')
    .innerJoin('person', 'person.id', 'activity.coordinator_id')
    .selectAll('activity')
    .select('person.name as coordinator_name')
    .execute();
  const stations = await db
    .selectFrom('activity_station')
    .select(['activity_id', 'station_id', 'answer'])
    .execute();
  const bands = await db
    .selectFrom('activity_band')
    .select(['activity_id', 'band'])
    .orderBy('frequency_mhz')
    .execute();
  const mine = new Set(
    viewer
      ? (
          await db
            .selectFrom('station_crew')
            .select('station_id')
            .where('person_id', '=', viewer.id)
            .execute()
        ).map((row) => row.station_id)
      : [],
  );
  const cards = rows.flatMap((row): ActivityCard[] => {
    const roster = stations.filter((station) => station.activity_id === row.id);
    const own = roster.filter((station) => mine.has(station.station_id));
    const coordinates = viewer?.id === row.coordinator_id && viewer.role !== 'operator';
    const known =
      row.state === 'published' ||
      own.length > 0 ||
      coordinates ||
      viewer?.role === 'administrator';
    if (!known) return [];
    return [
      {
        slug: row.slug,
        title: row.title,
        stage: stageOf(row.state, row.end_at, now),
        startMs: row.start_at,
        endMs: row.end_at,
        bands: bands.filter((one) => one.activity_id === row.id).map((one) => one.band),
        coordinatorName: row.coordinator_name,
        stations: roster.length,
        coming: roster.filter((station) => station.answer === 'coming').length,
        mine: coordinates
          ? 'coordinator'
          : own.length === 0
            ? 'none'
            : own.some((station) => station.answer === 'waiting')
              ? 'waiting'
              : 'answered',
        answersByMs: row.answers_by,
      },
    ];
  });
  const over = (card: ActivityCard) => card.endMs <= now;
  return cards.sort((a, b) => {
    if (over(a) !== over(b)) return over(a) ? 1 : -1;
    return over(a) ? b.startMs - a.startMs : a.startMs - b.startMs;
  });
}
