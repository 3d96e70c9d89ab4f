import { setTimeout as sleep } from 'node:timers/promises';
import { chromium, type Page } from 'playwright';
import { ensureBuilt } from '../../src/cli/lib/build.mjs';
import { openDatabase, type Db } from '../../src/server/db/connection';
import { DEMO_PASSWORD } from '../../db/seed/signIns';
import { startServer } from '../e2e/support/server';
import { BROWSER } from './drag';
import { planWeekend } from './planInstances';
import { queueRun } from './planQueue';
import { median, type Bench, type BenchResult } from './results';

const STATIONS = 60;
const WISHES = 300;
const STEPS = 60;
const STEP_PX = 12;
const NAME = 'plan.timetable60.worstFrameMs';

type Watched = Window & typeof globalThis & { heldFrames?: number[] };

/** A slot dragged over the timetable of sixty stations: from each move of the pointer to the picture it leads to. */
export const timetableDrag: Bench = {
  name: NAME,
  run: async (): Promise<BenchResult[]> => {
    await ensureBuilt();
    const server = await startServer({ demo: true });
    const db = openDatabase(server.databaseFile);
    const browser = await chromium.launch(BROWSER);
    try {
      const { slug } = await db.selectFrom('activity').select('slug').executeTakeFirstOrThrow();
      const runId = await queueRun(db, planWeekend(STATIONS, WISHES));
      await finished(db, runId);
      const page = await browser.newPage({ viewport: { width: 1440, height: 900 } });
      await signIn(page, server.url);
      await page.goto(`${server.url}/activities/${slug}/timetable`);
      await page.locator('.tt-slot').first().waitFor({ timeout: 30_000 });
      await page.waitForTimeout(1000);
      const slots = await page.locator('.tt-slot').count();
      await drag(page);
      const frames = await drag(page);
      if (frames.length < STEPS / 2) throw new Error(`Only ${frames.length} pictures came.`);
      return [
        {
          name: NAME,
          value: Math.max(...frames),
          unit: 'ms',
          note: `pointer to picture, the slowest of ${frames.length} moves; median ${median(frames).toFixed(1)} ms; ${STATIONS} stations, ${slots / 2} slots`,
        },
      ];
    } finally {
      await browser.close();
      await db.destroy();
      await server.stop();
    }
  },
};

/** Throws where the run has not become a draft within two minutes. */
async function finished(db: Db, runId: string): Promise<void> {
  for (let wait = 0; wait < 480; wait += 1) {
    const run = await db
      .selectFrom('plan_run')
      .select(['state', 'error'])
      .where('id', '=', runId)
      .executeTakeFirstOrThrow();
    if (run.state === 'done') return;
    if (run.state === 'failed') throw new Error(`The run failed: ${run.error ?? ''}`);
    await sleep(250);
  }
  throw new Error('The run did not end within two minutes.');
}

async function signIn(page: Page, url: string): Promise<void> {
  await page.goto(`${url}/sign-in`);
  await page.locator('input[type=email]').fill('marit@qk3osl.example');
  await page.locator('input[type=password]').fill(DEMO_PASSWORD);
  await page.locator('input[type=password]').press('Enter');
  await page.waitForURL((at) => !at.pathname.startsWith('/sign-in'));
}

/** Lifts a slot that lies in view, moves it to and fro, and puts it back. */
async function drag(page: Page): Promise<number[]> {
  const slot = page.locator('.tt-slot').nth(6);
  await slot.scrollIntoViewIfNeeded();
  const box = (await slot.boundingBox())!;
  const from = { x: box.x + box.width / 2, y: box.y + box.height / 2 };
  await page.mouse.move(from.x, from.y);
  await page.mouse.down();
  await page.evaluate(watch);
  for (let step = 1; step <= STEPS; step += 1) {
    await page.mouse.move(from.x + Math.min(step, STEPS - step) * STEP_PX, from.y);
    await page.evaluate(() => new Promise((resolve) => requestAnimationFrame(resolve)));
  }
  await page.keyboard.press('Escape');
  await page.mouse.up();
  await page.waitForTimeout(300);
  return page.evaluate(() => (window as Watched).heldFrames ?? []);
}

/** Runs in the page: notes for every move of the pointer when its picture was handed over. */
function watch(): void {
  const watched = window as Watched;
  const started = watched.heldFrames !== undefined;
  watched.heldFrames = [];
  if (started) return;
  window.addEventListener(
    'pointermove',
    (event) => {
      requestAnimationFrame(() => {
        const drawn = new MessageChannel();
        drawn.port1.onmessage = () => watched.heldFrames?.push(performance.now() - event.timeStamp);
        drawn.port2.postMessage(null);
      });
    },
    { capture: true },
  );
}
