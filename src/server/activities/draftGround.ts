import type { PlanProblem, PlanSlot } from '../../domain/activity/plan/types';
import type { SavedRun } from '../../domain/activity/run';
import type { Db } from '../db/connection';
import type { Tx } from '../db/transaction';
import { Conflict, NotFound } from '../errors';
import { wishIdOf } from './planInput';
import { savedRun } from './planRuns';
import { loadRevision, type LoadedRevision, type StoredSlot } from './revisions';

/** A draft with what its plan was computed from. */
export interface DraftGround {
  draft: LoadedRevision;
  saved: SavedRun;
  problem: PlanProblem;
}

/** Throws `NotFound` without a draft, `Conflict` when nothing tells any more what it was computed from. */
export async function draftGround(db: Db | Tx, activityId: string): Promise<DraftGround> {
  const draft = await loadRevision(db, activityId, 'draft');
  if (!draft) throw new NotFound('There is no draft of a plan yet. Compute one first.');
  const run =
    draft.row.run_id === null
      ? undefined
      : await db
          .selectFrom('plan_run')
          .select('problem_json')
          .where('id', '=', draft.row.run_id)
          .executeTakeFirst();
  const saved = run ? savedRun(run) : null;
  if (!saved?.problem) throw new Conflict('Compute a plan first, then change it by hand.');
  return { draft, saved, problem: saved.problem };
}

export function planSlotOf(slot: StoredSlot): PlanSlot {
  return {
    wishId: wishIdOf(slot.stationA, slot.stationB),
    band: slot.band,
    startMs: slot.startMs,
  };
}
