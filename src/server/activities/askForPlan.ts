import { z } from 'zod';
import type { PlanSlot } from '../../domain/activity/plan/types';
import type { SavedRun } from '../../domain/activity/run';
import { planWeights } from '../../domain/activity/weights';
import type { Viewer } from '../auth/viewer';
import { inTransaction, type Tx } from '../db/transaction';
import { Conflict } from '../errors';
import { newId } from '../ids';
import type { Services } from '../services';
import { requireEditor } from './access';
import { planInput, wishIdOf } from './planInput';
import { newestRun } from './planRuns';
import { activityView } from './records';
import { loadRevision, slotsInForce, type StoredSlot } from './revisions';

export const askForPlanSchema = z.object({
  /** `around`: fixed slots stand and as little as possible changes; `anew`: only what is fixed stands. */
  how: z
    .enum(['anew', 'around'], 'Say whether to plan anew or around what stands.')
    .default('anew'),
});

/**
 * Asks for a plan to be computed in the background, from everything as it stands now. Slots that are fixed or have
 * begun stand in every plan. Throws `NotFound`, `Forbidden`, or `Conflict` while another run is under way, nobody wishes
 * anything, or the activity is over.
 */
export async function askForPlan(
  services: Services,
  viewer: Pick<Viewer, 'id' | 'role'>,
  slug: string,
  { how }: z.output<typeof askForPlanSchema>,
): Promise<{ runId: string }> {
  const activity = await requireEditor(services.db, viewer, slug);
  const nowMs = services.now();
  if (activity.end_at <= nowMs) throw new Conflict('The activity is over.');
  const input = await planInput(services, activity);
  if (input.wishes.length === 0) {
    throw new Conflict(
      'There is nothing to plan yet: no two stations that are coming wish a contact with each other.',
    );
  }
  const { weights } = await activityView(services.db, activity, nowMs);
  return inTransaction(services.db, async (tx) => {
    const running = await newestRun(tx, activity.id);
    if (running && running.ended_at === null) {
      throw new Conflict('A plan is being computed already. Stop it first, or wait.');
    }
    const all = await standingSlots(tx, activity.id, nowMs);
    const known = new Set(input.wishes.map(({ id }) => id));
    const slots = all.filter((slot) => known.has(wishOf(slot)));
    const fixed = (slot: StoredSlot) => slot.pinned || slot.startMs <= nowMs;
    const saved: SavedRun = {
      input,
      pinned: slots.filter(fixed).map(planSlot),
      keep: how === 'around' ? slots.filter((slot) => !fixed(slot)).map(planSlot) : [],
      begun: all
        .filter((slot) => slot.startMs <= nowMs && !known.has(wishOf(slot)))
        .map(({ id: _, skedId: __, ...slot }) => slot),
      weights: planWeights(weights),
      problem: null,
    };
    const runId = newId();
    await tx
      .insertInto('plan_run')
      .values({
        id: runId,
        activity_id: activity.id,
        state: 'queued',
        problem_json: JSON.stringify(saved),
        progress_json: null,
        result_json: null,
        error: null,
        asked_by: viewer.id,
        asked_at: nowMs,
        leased_until: null,
        stop_asked_at: null,
        ended_at: null,
      })
      .execute();
    return { runId };
  });
}

/**
 * What a plan is computed from: the draft, else what is published and was not given back. A published slot that has
 * begun stands, whatever the draft says of its pair.
 */
async function standingSlots(tx: Tx, activityId: string, nowMs: number): Promise<StoredSlot[]> {
  const inForce = await slotsInForce(tx, activityId);
  const draft = await loadRevision(tx, activityId, 'draft');
  if (!draft) return inForce;
  const begun = inForce.filter(({ startMs }) => startMs <= nowMs);
  const pairs = new Set(begun.map(wishOf));
  return [...begun, ...draft.slots.filter((slot) => !pairs.has(wishOf(slot)))];
}

function wishOf(slot: StoredSlot): string {
  return wishIdOf(slot.stationA, slot.stationB);
}

function planSlot(slot: StoredSlot): PlanSlot {
  return { wishId: wishOf(slot), band: slot.band, startMs: slot.startMs };
}
