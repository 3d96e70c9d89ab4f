import type { RunView, SavedRun } from '../../domain/activity/run';
import type { PlanProgress, PlanResult } from '../../domain/activity/plan/types';
import type { Db } from '../db/connection';
import type { PlanRunRow } from '../db/tables';
import type { Tx } from '../db/transaction';

/** The newest run of an activity, or null. */
export async function newestRun(db: Db | Tx, activityId: string): Promise<PlanRunRow | null> {
  const row = await db
    .selectFrom('plan_run')
    .selectAll()
    .where('activity_id', '=', activityId)
    .orderBy('asked_at', 'desc')
    .orderBy('id')
    .limit(1)
    .executeTakeFirst();
  return row ?? null;
}

export function savedRun(row: Pick<PlanRunRow, 'problem_json'>): SavedRun {
  return JSON.parse(row.problem_json) as SavedRun;
}

export function runView(row: PlanRunRow): RunView {
  return {
    id: row.id,
    state: row.state,
    askedMs: row.asked_at,
    endedMs: row.ended_at,
    stopping: row.stop_asked_at !== null && row.ended_at === null,
    progress: progressOf(row),
    error: row.error,
    wishes: savedRun(row).input.wishes.length,
  };
}

/** How far a run is; of one that came to a plan, what is known of that plan. */
function progressOf(row: PlanRunRow): PlanProgress | null {
  if (row.result_json !== null) {
    const { plan, elapsedMs } = JSON.parse(row.result_json) as PlanResult;
    const { slots, worth, objective, bound, gap } = plan;
    return { phase: 'done', placed: slots.length, worth, objective, bound, gap, elapsedMs };
  }
  return row.progress_json === null ? null : (JSON.parse(row.progress_json) as PlanProgress);
}
