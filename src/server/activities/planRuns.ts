import { sql } from 'kysely';
import type { RunView, SavedRun } from '../../domain/activity/run';
import type { PlanProgress, PlanResult } from '../../domain/activity/plan/types';
import type { Db } from '../db/connection';
import type { PlanRunRow } from '../db/tables';
import type { Tx } from '../db/transaction';

/** A run without what it is computed from, which is large, and asked for again and again while one waits for it. */
export type RunHead = Omit<PlanRunRow, 'problem_json'>;

/** The newest run of an activity, or null. */
export async function newestRun(db: Db | Tx, activityId: string): Promise<RunHead | null> {
  const row = await db
    .selectFrom('plan_run')
    .select([
      'id',
      'activity_id',
      'state',
      'progress_json',
      'result_json',
      'error',
      'asked_by',
      'asked_at',
      'leased_until',
      'stop_asked_at',
      'ended_at',
    ])
    .where('activity_id', '=', activityId)
    // One that is under way is the newest, even when the clock was set back since the one before.
    .orderBy(sql`ended_at IS NULL`, 'desc')
    .orderBy('asked_at', 'desc')
    .orderBy(sql`rowid`, 'desc')
    .limit(1)
    .executeTakeFirst();
  return row ?? null;
}

export function savedRun(row: Pick<PlanRunRow, 'problem_json'>): SavedRun {
  return JSON.parse(row.problem_json) as SavedRun;
}

export async function runView(db: Db, row: RunHead): Promise<RunView> {
  return {
    id: row.id,
    state: row.state,
    askedMs: row.asked_at,
    endedMs: row.ended_at,
    stopping: row.stop_asked_at !== null && row.ended_at === null,
    progress: progressOf(row),
    error: row.error,
    wishes: await wishesOf(db, row.id),
  };
}

const MOST_KNOWN = 64;
/** By run; what a run is computed from does not change. */
const knownWishes = new Map<string, number>();

async function wishesOf(db: Db, runId: string): Promise<number> {
  const known = knownWishes.get(runId);
  if (known !== undefined) return known;
  const { wishes } = await db
    .selectFrom('plan_run')
    .select(sql<number>`json_array_length(problem_json, '$.input.wishes')`.as('wishes'))
    .where('id', '=', runId)
    .executeTakeFirstOrThrow();
  if (knownWishes.size >= MOST_KNOWN) knownWishes.clear();
  knownWishes.set(runId, wishes);
  return wishes;
}

/** How far a run is; of one that came to a plan, what is known of that plan. */
function progressOf(row: RunHead): PlanProgress | null {
  if (row.result_json !== null) {
    const { plan, elapsedMs } = JSON.parse(row.result_json) as PlanResult;
    const { slots, worth, objective, bound, gap } = plan;
    return { phase: 'done', placed: slots.length, worth, objective, bound, gap, elapsedMs };
  }
  return row.progress_json === null ? null : (JSON.parse(row.progress_json) as PlanProgress);
}
