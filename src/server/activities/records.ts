import type { Selectable } from 'kysely';
import { stageOf } from '../../domain/activity/states';
import type { ActivityView } from '../../domain/activity/views';
import { DEFAULT_WEIGHTS, type ActivityWeights } from '../../domain/activity/weights';
import type { Db } from '../db/connection';
import type { ActivityTable } from '../db/tables';
import type { Tx } from '../db/transaction';

export type ActivityRow = Selectable<ActivityTable>;

/** The activity with its bands, as pages and other use cases see it. */
export async function activityView(
  db: Db | Tx,
  row: ActivityRow,
  nowMs: number,
): Promise<ActivityView> {
  const coordinator = await db
    .selectFrom('person')
    .select('name')
    .where('id', '=', row.coordinator_id)
    .executeTakeFirstOrThrow();
  const bands = await db
    .selectFrom('activity_band')
    .selectAll()
    .where('activity_id', '=', row.id)
    .execute();
  return {
    id: row.id,
    slug: row.slug,
    version: row.version,
    title: row.title,
    state: row.state,
    stage: stageOf(row.state, row.end_at, nowMs),
    coordinatorId: row.coordinator_id,
    coordinatorName: coordinator.name,
    startMs: row.start_at,
    endMs: row.end_at,
    bands: bands
      .sort((a, b) => a.frequency_mhz - b.frequency_mhz)
      .map(({ band, frequency_mhz, mode }) => ({ band, frequencyMhz: frequency_mhz, mode })),
    slotMinutes: row.slot_minutes,
    gridMinutes: row.grid_minutes,
    bandChangeMinutes: row.band_change_minutes,
    mostInARow: row.most_in_a_row,
    leastPauseMinutes: row.least_pause_minutes,
    weights: { ...DEFAULT_WEIGHTS, ...(JSON.parse(row.weights_json) as Partial<ActivityWeights>) },
    invitation: row.invitation,
    notes: row.notes,
    answersByMs: row.answers_by,
  };
}
