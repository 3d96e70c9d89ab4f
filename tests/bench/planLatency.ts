import { setTimeout as sleep } from 'node:timers/promises';
import { ensureBuilt } from '../../src/cli/lib/build.mjs';
import { openDatabase } from '../../src/server/db/connection';
import { startServer } from '../e2e/support/server';
import { planWeekend } from './planInstances';
import { queueRun } from './planQueue';
import type { Bench, BenchResult } from './results';

const STATIONS = 40;
const WISHES = 200;
const IDLE_MS = 4000;
/** The solver gives up after 60 s by itself. */
const LONGEST_MS = 100_000;
const NAME = 'plan.webLatencyWhileSolvingMs';

/**
 * How long people wait for an answer of the web process while the background process computes a plan: the production
 * build, both processes as they run for people, and a light answer asked for again and again.
 */
export const planLatency: Bench = {
  name: NAME,
  run: async (): Promise<BenchResult[]> => {
    await ensureBuilt();
    const server = await startServer({ demo: true });
    const db = openDatabase(server.databaseFile);
    try {
      const url = `${server.url}/api/v1/openapi.json`;
      const idleUntil = Date.now() + IDLE_MS;
      await ask(url);
      const idle = await askUntil(url, () => Promise.resolve(Date.now() > idleUntil));
      const runId = await queueRun(db, planWeekend(STATIONS, WISHES));
      const queuedAt = Date.now();
      const busy = await askUntil(url, async () => {
        const { ended_at } = await db
          .selectFrom('plan_run')
          .select('ended_at')
          .where('id', '=', runId)
          .executeTakeFirstOrThrow();
        return ended_at !== null || Date.now() - queuedAt > LONGEST_MS;
      });
      const run = await db
        .selectFrom('plan_run')
        .select(['state', 'error'])
        .where('id', '=', runId)
        .executeTakeFirstOrThrow();
      if (run.state !== 'done') throw new Error(`The run is ${run.state}: ${run.error ?? ''}`);
      const seconds = ((Date.now() - queuedAt) / 1000).toFixed(1);
      const note = `${busy.length} requests in ${seconds} s of ${STATIONS} stations and ${WISHES} wishes`;
      return [
        { name: NAME, value: Math.max(...busy), unit: 'ms', note: `worst; ${note}` },
        {
          name: 'plan.webLatencyWhileSolvingP95Ms',
          value: p95(busy),
          unit: 'ms',
          peer: `idle before: p95 ${p95(idle).toFixed(1)} ms, worst ${Math.max(...idle).toFixed(1)} ms`,
          note,
        },
      ];
    } finally {
      await db.destroy();
      await server.stop();
    }
  },
};

async function ask(url: string): Promise<number> {
  const from = performance.now();
  const response = await fetch(url);
  await response.arrayBuffer();
  if (!response.ok) throw new Error(`${url} answered ${response.status}.`);
  return performance.now() - from;
}

/** Asks one after the other until it is over, which is looked up four times a second. */
async function askUntil(url: string, over: () => Promise<boolean>): Promise<number[]> {
  const took: number[] = [];
  let nextLook = 0;
  for (;;) {
    took.push(await ask(url));
    if (performance.now() >= nextLook) {
      if (await over()) return took;
      nextLook = performance.now() + 250;
    }
    await sleep(10);
  }
}

function p95(values: readonly number[]): number {
  const sorted = [...values].sort((a, b) => a - b);
  return sorted[Math.min(sorted.length - 1, Math.floor(sorted.length * 0.95))]!;
}
