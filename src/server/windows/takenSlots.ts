import type { Interval } from '../../domain/time/interval';
import type { ChosenStation, TakenSlot } from '../../domain/window/searchData';
import type { Viewer } from '../auth/viewer';
import type { Db } from '../db/connection';

/**
 * Agreed skeds of the stations within the span, and offers that the viewer is party to. Who the others are is
 * told only for the viewer's own skeds; of anybody else's, only that the station is taken.
 */
export async function takenSlots(
  db: Db,
  viewer: Pick<Viewer, 'id'> | null,
  stations: readonly ChosenStation[],
  span: Interval,
): Promise<TakenSlot[]> {
  const callSigns = new Map(
    stations.flatMap(({ id, callSign }) => (id === null ? [] : [[id, callSign] as const])),
  );
  if (callSigns.size === 0) return [];
  const rows = await db
    .selectFrom('sked')
    .innerJoin('sked_party', 'sked_party.sked_id', 'sked.id')
    .innerJoin('station', 'station.id', 'sked_party.station_id')
    .leftJoin('station_crew', (join) =>
      join
        .onRef('station_crew.station_id', '=', 'sked_party.station_id')
        .on('station_crew.person_id', '=', viewer?.id ?? ''),
    )
    .select([
      'sked.id',
      'sked.state',
      'sked.start_at',
      'sked.end_at',
      'sked_party.station_id',
      'station.call_sign',
      'station_crew.person_id',
    ])
    .where('sked.id', 'in', (bound) =>
      bound
        .selectFrom('sked_party')
        .select('sked_party.sked_id')
        .where('sked_party.station_id', 'in', [...callSigns.keys()]),
    )
    .where('sked_party.left_at', 'is', null)
    .where('sked.state', 'in', ['agreed', 'offered'])
    .where('sked.start_at', '<', span.endMs)
    .where('sked.end_at', '>', span.startMs)
    .orderBy('sked.start_at')
    .orderBy('sked_party.place')
    .execute();
  const skeds = groupById(rows);
  const slots: TakenSlot[] = [];
  for (const [skedId, parties] of skeds) {
    const first = parties[0]!;
    const bound = parties.flatMap((party) => callSigns.get(party.station_id) ?? []);
    const mine = parties.some((party) => party.person_id !== null);
    if (bound.length === 0 || (first.state !== 'agreed' && !mine)) continue;
    const others = parties
      .filter((party) => party.person_id === null)
      .map((party) => party.call_sign);
    slots.push({
      startMs: first.start_at,
      endMs: first.end_at,
      state: first.state === 'agreed' ? 'agreed' : 'offered',
      callSigns: bound,
      skedId: mine ? skedId : null,
      partner: mine && others.length > 0 ? others.join(', ') : null,
    });
  }
  return slots;
}

function groupById<T extends { id: string }>(rows: readonly T[]): Map<string, T[]> {
  const groups = new Map<string, T[]>();
  for (const row of rows) {
    const group = groups.get(row.id);
    if (group) group.push(row);
    else groups.set(row.id, [row]);
  }
  return groups;
}
