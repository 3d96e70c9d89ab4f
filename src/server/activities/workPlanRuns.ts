import { chanceOf, marginOf } from '../../domain/activity/slotFigures';
import { explainLeftOut } from '../../domain/activity/plan/explain';
import { buildProblem } from '../../domain/activity/plan/options';
import { PlanProblemError } from '../../domain/activity/plan/grid';
import type { PlanProgress, PlanResult } from '../../domain/activity/plan/types';
import type { SavedRun } from '../../domain/activity/run';
import type { BandId } from '../../domain/station/bands';
import { MINUTE_MS } from '../../domain/time/interval';
import type { PlanRunRow } from '../db/tables';
import { inTransaction } from '../db/transaction';
import { log } from '../log';
import type { Services } from '../services';
import { startPlanRun } from '../solver/startPlanRun';
import { savedRun } from './planRuns';
import { saveDraft } from './revisions';

const LEASE_MS = 30_000;
const BEAT_MS = 1000;
/** After this many seconds the best plan so far is taken; the page tells how far from the bound it is. */
const TIME_LIMIT_S = 60;

/**
 * Computes the plan of one queued run, if there is one, and puts it into the draft of its activity. The run belongs to
 * this worker while it renews its lease; one whose worker died is begun again. Returns whether there was one.
 */
export async function workPlanRuns(services: Services): Promise<boolean> {
  const run = await lease(services);
  if (!run) return false;
  try {
    await work(services, run);
  } catch (error) {
    const told = error instanceof PlanProblemError;
    if (!told) log.error({ runId: run.id, err: error }, 'plan run failed');
    await services.db
      .updateTable('plan_run')
      .set({
        state: 'failed',
        error: told ? error.message : 'The computation broke. Try again.',
        ended_at: services.now(),
      })
      .where('id', '=', run.id)
      .where('ended_at', 'is', null)
      .execute();
  }
  return true;
}

async function lease({ db, now }: Services): Promise<PlanRunRow | null> {
  const at = now();
  const row = await db
    .updateTable('plan_run')
    .set({ state: 'running', leased_until: at + LEASE_MS })
    .where('id', 'in', (from) =>
      from
        .selectFrom('plan_run')
        .select('id')
        .where('ended_at', 'is', null)
        .where((or) => or.or([or('leased_until', 'is', null), or('leased_until', '<=', at)]))
        .orderBy('asked_at')
        .limit(1),
    )
    .returningAll()
    .executeTakeFirst();
  return row ?? null;
}

async function work(services: Services, run: PlanRunRow): Promise<void> {
  const saved = savedRun(run);
  const problem = buildProblem(saved.input, saved);
  await services.db
    .updateTable('plan_run')
    .set({ problem_json: JSON.stringify({ ...saved, problem } satisfies SavedRun) })
    .where('id', '=', run.id)
    .execute();
  let progress: PlanProgress | null = null;
  const running = startPlanRun(problem, {
    timeLimitS: TIME_LIMIT_S,
    onProgress: (next) => {
      progress = next;
    },
  });
  const beat = setInterval(() => {
    void renew(services, run.id, progress).then((stop) => {
      if (stop) running.stop();
    });
  }, BEAT_MS);
  try {
    const result = await running.done;
    await keep(services, run, { ...saved, problem }, result, progress);
  } finally {
    clearInterval(beat);
    running.stop();
  }
}

/** Tells how far the run is and that somebody works on it. Returns whether it should stop. */
async function renew(
  { db, now }: Services,
  runId: string,
  progress: PlanProgress | null,
): Promise<boolean> {
  try {
    const row = await db
      .updateTable('plan_run')
      .set({
        leased_until: now() + LEASE_MS,
        ...(progress ? { progress_json: JSON.stringify(progress) } : {}),
      })
      .where('id', '=', runId)
      .where('ended_at', 'is', null)
      .returning('stop_asked_at')
      .executeTakeFirst();
    return row === undefined || row.stop_asked_at !== null;
  } catch (error) {
    log.warn({ runId, err: error }, 'progress of a plan not written');
    return false;
  }
}

/** The plan becomes the draft of the activity, with the reasons of what was left out. */
async function keep(
  services: Services,
  run: PlanRunRow,
  saved: SavedRun,
  result: PlanResult,
  progress: PlanProgress | null,
): Promise<void> {
  const { input, pinned } = saved;
  const problem = saved.problem!;
  const { plan } = result;
  const leftOut = explainLeftOut(input, plan.slots);
  const wishes = new Map(input.wishes.map((wish) => [wish.id, wish]));
  const fixed = new Set(pinned.map(({ wishId }) => wishId));
  const computed = plan.slots.map((slot) => {
    const wish = wishes.get(slot.wishId)!;
    return {
      stationA: wish.a,
      stationB: wish.b,
      band: slot.band as BandId,
      startMs: slot.startMs,
      endMs: slot.startMs + problem.slotMinutes * MINUTE_MS,
      pinned: fixed.has(slot.wishId),
      priority: wish.priority,
      chance: chanceOf(problem, slot),
      marginDb: marginOf(input, slot),
    };
  });
  const nowMs = services.now();
  await inTransaction(services.db, async (tx) => {
    const ended = await tx
      .updateTable('plan_run')
      .set({
        state: result.ending === 'stopped' ? 'stopped' : 'done',
        result_json: JSON.stringify(result),
        ...(progress ? { progress_json: JSON.stringify(progress) } : {}),
        ended_at: nowMs,
        leased_until: null,
      })
      .where('id', '=', run.id)
      .where('ended_at', 'is', null)
      .returning('id')
      .executeTakeFirst();
    if (!ended) return;
    await saveDraft(tx, run.activity_id, {
      slots: [...saved.begun, ...computed],
      leftOutJson: JSON.stringify(leftOut),
      runId: run.id,
      atMs: nowMs,
    });
    await tx
      .updateTable('activity')
      .set((of) => ({ state: 'planned', version: of('version', '+', 1), updated_at: nowMs }))
      .where('id', '=', run.activity_id)
      .where('state', '=', 'collecting')
      .execute();
  });
}
