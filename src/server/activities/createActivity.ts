import { settingsProblems, type ActivitySettings } from '../../domain/activity/settings';
import { slugOf } from '../../domain/activity/slug';
import type { Viewer } from '../auth/viewer';
import { inTransaction, type Tx } from '../db/transaction';
import { Forbidden, InvalidInput } from '../errors';
import { newId } from '../ids';
import { recordAct } from '../people/recordAct';
import type { Services } from '../services';

/** Begins an activity; the person becomes its coordinator. Throws `Forbidden` or `InvalidInput`. */
export async function createActivity(
  services: Services,
  viewer: Pick<Viewer, 'id' | 'role'>,
  settings: ActivitySettings,
): Promise<{ id: string; slug: string }> {
  if (viewer.role === 'operator') throw new Forbidden('Only coordinators begin activities.');
  const now = services.now();
  refuseProblems(settings, now);
  return inTransaction(services.db, async (tx) => {
    const id = newId();
    const slug = await freeSlug(tx, settings.title);
    await tx
      .insertInto('activity')
      .values({
        ...settingsColumns(settings),
        id,
        slug,
        state: 'collecting',
        coordinator_id: viewer.id,
        created_at: now,
        updated_at: now,
      })
      .execute();
    await saveBands(tx, id, settings);
    await recordAct(tx, services, viewer, 'createActivity', id);
    return { id, slug };
  });
}

/** Throws `InvalidInput` with everything that does not fit together. */
export function refuseProblems(settings: ActivitySettings, nowMs: number): void {
  const problems = settingsProblems(settings, nowMs);
  if (problems[0]) throw new InvalidInput(problems[0].message, problems);
}

export function settingsColumns(settings: ActivitySettings) {
  return {
    title: settings.title,
    start_at: settings.startMs,
    end_at: settings.endMs,
    slot_minutes: settings.slotMinutes,
    grid_minutes: settings.gridMinutes,
    band_change_minutes: settings.bandChangeMinutes,
    most_in_a_row: settings.mostInARow,
    least_pause_minutes: settings.leastPauseMinutes,
    weights_json: JSON.stringify(settings.weights),
    invitation: settings.invitation,
    notes: settings.notes,
    answers_by: settings.answersByMs,
  };
}

/** Puts the bands of the settings in the place of those that were there. */
export async function saveBands(
  tx: Tx,
  activityId: string,
  { bands }: ActivitySettings,
): Promise<void> {
  await tx.deleteFrom('activity_band').where('activity_id', '=', activityId).execute();
  await tx
    .insertInto('activity_band')
    .values(
      bands.map(({ band, frequencyMhz, mode }) => ({
        activity_id: activityId,
        band,
        frequency_mhz: frequencyMhz,
        mode,
      })),
    )
    .execute();
}

/** The title's own address, with a number behind it where another activity has it. */
async function freeSlug(tx: Tx, title: string): Promise<string> {
  const wanted = slugOf(title);
  const rows = await tx
    .selectFrom('activity')
    .select('slug')
    .where('slug', 'like', `${wanted}%`)
    .execute();
  const taken = new Set(rows.map((row) => row.slug));
  let slug = wanted;
  for (let number = 2; taken.has(slug); number += 1) slug = `${wanted}-${number}`;
  return slug;
}
